import { readFileSync } from 'node:fs';
import { join } from 'node:path';

/** A capture with its truth. `label`: folded, clean, grey (between) or na (nothing can be said). */
export interface LabelledCapture {
  path: string;
  file: string;
  part: string;
  family: string;
  operation: string;
  label: string;
  isIrregular: boolean;
  /** Folded share of ten equal bands from 0 to fs/2, dB. */
  bandFoldDb: number[];
  foldedTones: { trueHz: number; foldedHz: number; isVisible: boolean }[];
  pairId: string;
  sampleRateHz: number;
}

/** Reads DIR/labels.csv: columns file, part, family, label, band_fold_db, tones_* (lists with |), pair_id, fs_hz, … */
export function readLabelledSet(directory: string): LabelledCapture[] {
  const [head, ...rows] = parseCsv(readFileSync(join(directory, 'labels.csv'), 'utf8'));
  if (head === undefined) throw new Error(`${directory}/labels.csv is empty.`);
  return rows.map((cells) => {
    const cell = (name: string): string => cells[head.indexOf(name)] ?? '';
    const list = (name: string): string[] => (cell(name) === '' ? [] : cell(name).split('|'));
    const visible = list('tones_visible');
    const folded = list('tones_folded_hz').map(Number);
    return {
      path: join(directory, cell('file')),
      file: cell('file'),
      part: cell('part'),
      family: cell('family'),
      operation: cell('op'),
      label: cell('label'),
      isIrregular: cell('csv_variant') === 'irregular',
      bandFoldDb: list('band_fold_db').map(Number),
      foldedTones: list('tones_true_hz')
        .map((trueHz, index) => ({
          trueHz: Number(trueHz),
          foldedHz: folded[index] ?? Number.NaN,
          isVisible: visible[index] === '1',
        }))
        .filter((tone) => Number.isFinite(tone.trueHz) && tone.trueHz > Number(cell('fs_hz')) / 2),
      pairId: cell('pair_id'),
      sampleRateHz: Number(cell('fs_hz')),
    };
  });
}

function parseCsv(text: string): string[][] {
  const rows: string[][] = [];
  let row: string[] = [];
  let cell = '';
  let quoted = false;
  for (let n = 0; n < text.length; n++) {
    const sign = text[n] as string;
    if (quoted) {
      if (sign === '"' && text[n + 1] === '"') {
        cell += '"';
        n++;
      } else if (sign === '"') quoted = false;
      else cell += sign;
    } else if (sign === '"') quoted = true;
    else if (sign === ',') {
      row.push(cell);
      cell = '';
    } else if (sign === '\n') {
      row.push(cell);
      rows.push(row);
      row = [];
      cell = '';
    } else if (sign !== '\r') cell += sign;
  }
  if (cell !== '' || row.length > 0) rows.push([...row, cell]);
  return rows;
}
