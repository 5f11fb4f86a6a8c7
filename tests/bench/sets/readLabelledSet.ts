import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { LabelledCapture, LabelledTone } from './LabelledCapture.js';
import { parseCsv } from './parseCsv.js';

const labels = ['folded', 'grey', 'clean', 'na'] as const;
const needed = ['file', 'part', 'family', 'label', 'fs_hz', 'band_fold_db', 'tones_true_hz', 'tones_folded_hz'];
/** The lists name the strongest lines only: as many as this, and there may be more. A recording may always hold more. */
const longestList = 8;

/**
 * Reads DIR/labels.csv: one row a capture, lists with |, columns in any order.
 * @throws Error when a needed column is missing or a label is unknown
 */
export function readLabelledSet(directory: string, set = directory): LabelledCapture[] {
  const path = join(directory, 'labels.csv');
  const [head, ...rows] = parseCsv(readFileSync(path, 'utf8'));
  const missing = needed.filter((name) => !head?.includes(name));
  if (head === undefined || missing.length > 0)
    throw new Error(`${path} lacks the columns ${missing.join(', ')}: it is no table of labelled captures.`);
  return rows.map((cells, index) => {
    const cell = (name: string): string => cells[head.indexOf(name)] ?? '';
    const list = (name: string): string[] => (cell(name) === '' ? [] : cell(name).split('|'));
    const label = labels.find((one) => one === cell('label'));
    if (label === undefined)
      throw new Error(`${path}, row ${index + 2}: the label "${cell('label')}" is none of ${labels.join(', ')}.`);
    const tones = readTones(list('tones_true_hz'), list('tones_folded_hz'), list('tones_visible'));
    return {
      set,
      path: join(directory, cell('file')),
      file: cell('file'),
      part: cell('part'),
      family: cell('family'),
      operation: cell('op'),
      filter: cell('filter'),
      label,
      source: cell('source'),
      sampleRateHz: Number(cell('fs_hz')),
      isIrregular: cell('csv_variant') === 'irregular',
      bandFoldDb: list('band_fold_db').map(Number),
      tones: tones.filter(({ trueHz }) => trueHz >= Number(cell('fs_hz')) / 2),
      hasAllTones:
        cell('part') !== 'real' && tones.length < longestList && tones.every(({ foldedHz }) => foldedHz !== null),
      isRateRaised: cell('bandwidth_label') === 'upsampled',
      trueBandwidthHz: numberOrNull(cell('true_bandwidth_hz')),
      defects: list('defects'),
      lookalike: cell('lookalike'),
      pairId: cell('pair_id'),
      evidence: cell('evidence'),
      trueClearToHz: numberOrNull(cell('true_clear_to_hz')),
    };
  });
}

function readTones(trueHz: string[], foldedHz: string[], visible: string[]): LabelledTone[] {
  return trueHz.map((value, index) => {
    const folded = Number(foldedHz[index] ?? 'nan');
    return {
      trueHz: Number(value),
      foldedHz: Number.isFinite(folded) ? folded : null,
      isVisible: visible[index] === '1',
    };
  });
}

function numberOrNull(text: string): number | null {
  return text === '' || Number.isNaN(Number(text)) ? null : Number(text);
}
