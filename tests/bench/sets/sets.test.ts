import { existsSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, describe, expect, it } from 'vitest';
import { recordingOf } from './LabelledCapture.js';
import { makeLabelledSet } from './makeLabelledSet.js';
import { parseCsv } from './parseCsv.js';
import { readLabelledSet } from './readLabelledSet.js';

const directory = mkdtempSync(join(tmpdir(), 'overfold-bench-test-'));
afterAll(() => rmSync(directory, { recursive: true, force: true }));
const head =
  'file,part,family,label,fs_hz,band_fold_db,tones_true_hz,tones_folded_hz,tones_visible,source,pair_id,evidence,csv_variant';
const write = (...rows: string[]): void => writeFileSync(join(directory, 'labels.csv'), [head, ...rows].join('\n'));

describe('readLabelledSet', () => {
  it('reads labels, lists and tones beyond fs/2', () => {
    write(
      'a.wav,synthetic,mains,folded,1000,-90|-20,620|400|900,380|400|nan,1|1|sweep,,P1,tone,',
      'b.csv,real,real,clean,50,,,,,"rec, one",,,irregular',
    );
    const [one, other] = readLabelledSet(directory, 'set');
    expect(one).toMatchObject({
      file: 'a.wav',
      label: 'folded',
      sampleRateHz: 1000,
      bandFoldDb: [-90, -20],
      tones: [
        { trueHz: 620, foldedHz: 380, isVisible: true },
        { trueHz: 900, foldedHz: null, isVisible: false },
      ],
      hasAllTones: false,
    });
    expect(other).toMatchObject({ source: 'rec, one', isIrregular: true, tones: [], hasAllTones: false });
  });

  it('resamples by recording, by event, or by capture', () => {
    write(
      'a.wav,real,real,clean,50,,,,,rec,,,',
      'b.wav,synthetic,pair,clean,50,,,,,,P1,,',
      'c.wav,synthetic,noise,clean,50,,,,,,,,',
    );
    expect(readLabelledSet(directory, 's').map(recordingOf)).toEqual(['rec', 's/pair P1', 's/c.wav']);
  });

  it('refuses a table without labels or with an unknown one', () => {
    write('a.wav,real,real,maybe,50,,,,,,,,');
    expect(() => readLabelledSet(directory)).toThrow('row 2: the label "maybe" is none of folded, grey, clean, na');
    writeFileSync(join(directory, 'labels.csv'), 'file,size\na.wav,3\n');
    expect(() => readLabelledSet(directory)).toThrow('lacks the columns part, family, label');
  });
});

describe('parseCsv', () => {
  it('reads quoted cells with commas, quotes and line ends (RFC 4180)', () => {
    expect(parseCsv('a,"b,""c""\nd"\r\n1,\n')).toEqual([
      ['a', 'b,"c"\nd'],
      ['1', ''],
    ]);
  });
});

describe('makeLabelledSet', () => {
  it('calls the command with seed and place', () => {
    const script = join(directory, 'make.mjs');
    writeFileSync(
      script,
      "import { writeFileSync } from 'node:fs'; writeFileSync(process.argv[5] + '/seed' + process.argv[3], '');",
    );
    makeLabelledSet(`${process.execPath} ${script}`, '901', directory);
    expect(existsSync(join(directory, 'seed901'))).toBe(true);
  });

  it('says what the command said when it fails', () => {
    const script = join(directory, 'fail.mjs');
    writeFileSync(script, "console.error('no room'); process.exit(3);");
    expect(() => makeLabelledSet(`${process.execPath} ${script}`, '1', directory)).toThrow(/status 3:\nno room/);
    expect(() => makeLabelledSet('no-such-program-here', '1', directory)).toThrow('could not be started');
  });
});
