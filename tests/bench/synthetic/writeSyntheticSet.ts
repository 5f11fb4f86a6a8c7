import { mkdirSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { encodeWav } from '../../support/encodeWav.js';
import { plainWelch } from '../simple/plainWelch.js';
import { simpleLevels } from '../simple/simpleMethods.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';
import { between, gaussian, meanPower, pick } from './drawing.js';
import { makeBursts, makeFilteredNoise, makeImpacts, makeSkewedNoise } from './families/broadband.js';
import { makeIrregular } from './families/irregular.js';
import { makeLookalikes } from './families/lookalikes.js';
import { makeCoastDown, makeGear, makeSupply, makeWander } from './families/machines.js';
import { makeLogSweep, makePair, makeRaisedRate } from './families/sweepsAndPairs.js';
import { isVisibleAt } from './isVisibleAt.js';
import type { MadeCapture, MakeFamily } from './MadeCapture.js';
import { trueClearToHz } from './trueClearToHz.js';
import { truthOf } from './truthOf.js';

const families: readonly MakeFamily[] = [
  makeWander,
  makeCoastDown,
  makeGear,
  makeSupply,
  makeFilteredNoise,
  makeSkewedNoise,
  makeImpacts,
  makeBursts,
  makeLogSweep,
  makePair,
  makeRaisedRate,
  makeIrregular,
];
const columns = [
  ...['file', 'part', 'family', 'op', 'filter', 'label', 'source', 'csv_variant', 'fs_hz', 'band_fold_db'],
  ...['tones_true_hz', 'tones_folded_hz', 'tones_visible', 'bandwidth_label', 'true_bandwidth_hz', 'defects'],
  ...['lookalike', 'pair_id', 'evidence', 'true_clear_to_hz'],
] as const;
type Row = Partial<Record<(typeof columns)[number], string | number>>;

/** Lines listed a capture; level at the edge from which there is no roll-off to speak of. */
const [longestList, noRollOffDb] = [8, -25] as const;

/**
 * A labelled set from a seed: captures and labels.csv, the truth known from the making. Every family brings `perFamily`
 * captures, every second one folding; the look-alikes come once for every two of these.
 */
export function writeSyntheticSet(directory: string, seed: number, perFamily: number): void {
  const random = seededRandom(seed);
  mkdirSync(join(directory, 'captures'), { recursive: true });
  const rows: Row[] = [];
  const add = (made: MadeCapture): void => {
    const name = `captures/b${String(rows.length + 1).padStart(4, '0')}`;
    rows.push(writeCapture(directory, name, made, random));
  };
  for (let index = 0; index < perFamily; index++) {
    for (const make of families) make(random, index % 2 === 0, index).forEach(add);
    if (index % 2 === 0) makeLookalikes(random, false, index).forEach(add);
  }
  const lines = rows.map((row) => columns.map((column) => quoted(String(row[column] ?? ''))).join(','));
  writeFileSync(join(directory, 'labels.csv'), `${[columns.join(','), ...lines].join('\n')}\n`);
}

function writeCapture(directory: string, name: string, made: MadeCapture, random: () => number): Row {
  const { sampleRateHz } = made;
  const ratioDb = made.signalToNoiseDb === undefined ? pick(random, [15, 25, 35, 50, 65, null]) : made.signalToNoiseDb;
  const clean = made.rightful.map((value, n) => value + (made.folded[n] as number));
  const noisePower = ratioDb === null ? 0 : meanPower(clean) * 10 ** (-ratioDb / 10);
  const noise = gaussian(random, clean.length).map((value) => Math.sqrt(noisePower) * value);
  const samples = clean.map((value, n) => value + (noise[n] as number));
  const peak = samples.reduce((top, value) => Math.max(top, Math.abs(value)), 0);
  const gain = between(random, 0.3, 0.92) / peak;
  const file = writeSamples(
    directory,
    name,
    samples.map((value) => value * gain),
    made,
    random,
  );
  const truth = truthOf({ rightful: made.rightful, folded: made.folded, noise });
  const listed = made.tones.slice(0, longestList);
  const visible = made.timesS
    ? []
    : isVisibleAt(
        samples,
        sampleRateHz,
        listed.map(({ foldedHz }) => foldedHz),
      );
  const edgeDb = simpleLevels(samples, sampleRateHz)?.edgeAgainstMidDb ?? 0;
  const seen = visible.includes(true) ? 'tone' : edgeDb > noRollOffDb ? 'no_rolloff' : 'weak';
  const clearTo = made.edge === undefined ? null : clearToOf(made, clean, (2 * noisePower) / sampleRateHz);
  return {
    file,
    part: 'synthetic',
    family: made.family,
    op: made.raisedFromHz === undefined ? 'sampled' : 'rate raised',
    filter: made.filter,
    label: truth.label,
    csv_variant: made.timesS ? 'irregular' : '',
    fs_hz: sampleRateHz,
    band_fold_db: truth.bandFoldDb.map((level) => level.toFixed(2)).join('|'),
    tones_true_hz: listed.map(({ trueHz }) => trueHz.toFixed(4)).join('|'),
    tones_folded_hz: listed.map(({ foldedHz }) => foldedHz?.toFixed(4) ?? 'nan').join('|'),
    tones_visible: visible
      .map((one, index) => (listed[index]?.foldedHz === null ? 'sweep' : one ? '1' : '0'))
      .join('|'),
    bandwidth_label: made.raisedFromHz === undefined ? 'full' : 'upsampled',
    true_bandwidth_hz: made.raisedFromHz === undefined ? '' : 0.45 * made.raisedFromHz,
    lookalike: made.lookalike ?? '',
    pair_id: made.pairId ?? '',
    evidence: made.evidence ?? (truth.label === 'folded' ? seen : ''),
    true_clear_to_hz: clearTo?.toFixed(3) ?? '',
  };
}

/** A 16-bit WAV or a CSV with time stamps; uneven ones are CSV always. */
function writeSamples(
  directory: string,
  name: string,
  samples: Float64Array,
  { timesS, sampleRateHz }: MadeCapture,
  random: () => number,
): string {
  if (timesS === undefined && random() < 0.6) {
    writeFileSync(join(directory, `${name}.wav`), encodeWav([samples], sampleRateHz));
    return `${name}.wav`;
  }
  const isSemicolon = random() < 0.3;
  const rows = Array.from(samples, (value, n) => {
    const [time, text] = [(timesS?.[n] ?? n / sampleRateHz).toFixed(9), value.toPrecision(7)];
    return isSemicolon ? `${time};${text}`.replaceAll('.', ',') : `${time},${text}`;
  });
  const head = isSemicolon ? 'time [s];value' : 'time_s,value';
  writeFileSync(join(directory, `${name}.csv`), `${head}\n${rows.join('\n')}\n`);
  return `${name}.csv`;
}

function clearToOf(made: MadeCapture, signal: Float64Array, noiseDensity: number): number {
  const { sampleRateHz, density, edge } = made;
  const averaged = plainWelch(signal, sampleRateHz, 1024);
  const steps = averaged.length - 1;
  let exact = averaged;
  if (density !== undefined) {
    const known = averaged.map((_, step) => density((step * sampleRateHz) / 2 / steps));
    // The known density has the right shape only: its level comes from the samples' power.
    const power = known.reduce((sum, value) => sum + value, 0) * (sampleRateHz / 2 / steps);
    exact = known.map((value) => (value * meanPower(signal)) / power);
  }
  const top = exact.subarray(Math.ceil(0.98 * steps), steps);
  const edgeDensity = edge === 'linesOnly' ? 0 : top.reduce((sum, value) => sum + value, 0) / top.length;
  return trueClearToHz(
    exact.map((value) => value + noiseDensity),
    edgeDensity + noiseDensity,
    sampleRateHz,
    defaultThresholds.requiredProtectionDb,
  );
}

function quoted(cell: string): string {
  return /[",\n]/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell;
}
