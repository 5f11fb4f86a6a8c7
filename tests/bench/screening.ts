import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { parseArgs } from 'node:util';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { ChannelScreen, Verdict } from '../../shared/schemas/screening.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import { screenFile } from '../../worker/screenFile.js';
import { type LabelledCapture, readLabelledSet } from './labelledSet.js';
import { foundAt, rocArea, shareText } from './rocArea.js';
import { writeSyntheticSet } from './syntheticSet.js';

interface Screened {
  truth: LabelledCapture;
  screen: ChannelScreen | null;
  edgeAgainstMidDb: number;
  edgeAgainstTotalDb: number;
}

const { values } = parseArgs({
  options: {
    corpus: { type: 'string' },
    seed: { type: 'string', default: '1' },
    pairs: { type: 'boolean', default: false },
    list: { type: 'boolean', default: false },
  },
});
const given = values.corpus ?? process.env['OVERFOLD_CORPUS'];
function screenAll(captures: LabelledCapture[]): Screened[] {
  return captures.map((truth) => {
    const other = values.pairs
      ? captures.find((one) => one !== truth && truth.pairId !== '' && one.pairId === truth.pairId)
      : undefined;
    const sheet: AcquisitionSheet = {};
    try {
      const { screens, measurements } = screenFile(truth.path, {
        sheet,
        thresholds: defaultThresholds,
        companion: other === undefined ? null : { path: other.path, name: other.file, sheet: {} },
      });
      const record = measurements[0]?.record;
      const levels = record?.profile?.tonelessDb.slice() ?? [];
      const middle = levels
        .slice(Math.floor(0.3 * levels.length), Math.floor(0.8 * levels.length))
        .sort((a, b) => a - b);
      const edgeDb = record?.edge?.densityDb ?? -200;
      return {
        truth,
        screen: screens[0] ?? null,
        edgeAgainstMidDb: edgeDb - (middle[middle.length >> 1] ?? 0),
        edgeAgainstTotalDb: edgeDb - (record?.level?.powerDb ?? 0) + 10 * Math.log10((record?.sampleRateHz ?? 2) / 2),
      };
    } catch (error) {
      console.error(`${truth.file} (${truth.label}): ${error instanceof Error ? error.message : String(error)}`);
      return { truth, screen: null, edgeAgainstMidDb: -200, edgeAgainstTotalDb: -200 };
    }
  });
}

function report(all: Screened[]): void {
  const withScore = all.map((one) => ({ ...one, score: one.screen?.foldScore ?? 0.4 }));
  const folded = withScore.filter(({ truth }) => truth.label === 'folded');
  const clean = withScore.filter(({ truth }) => truth.label === 'clean');
  const scores = (set: typeof folded): number[] => set.map(({ score }) => score);
  console.log(`captures: ${all.length} (${folded.length} folded, ${clean.length} clean)`);
  for (const part of ['all', 'real', 'synthetic']) {
    const [f, c] = [folded, clean].map((set) =>
      scores(set.filter(({ truth }) => part === 'all' || truth.part === part)),
    ) as [number[], number[]];
    if (f.length === 0 || c.length === 0) continue;
    console.log(
      `area under ROC, ${part}: ${rocArea(f, c).toFixed(3)}; found at 2 % false alarms ${(100 * foundAt(f, c, 0.02)).toFixed(0)} %, at 5 % ${(100 * foundAt(f, c, 0.05)).toFixed(0)} %`,
    );
  }
  const regular = (set: typeof folded): typeof folded => set.filter(({ truth }) => !truth.isIrregular);
  for (const [name, key] of [
    ['level at the edge against mid-band', 'edgeAgainstMidDb'],
    ['level at the edge against total', 'edgeAgainstTotalDb'],
  ] as const) {
    const area = rocArea(
      regular(folded).map((one) => one[key]),
      regular(clean).map((one) => one[key]),
    );
    console.log(`  simple method, ${name} (uniform captures): ${area.toFixed(3)}`);
  }
  console.log(
    `  this engine on the same captures: ${rocArea(scores(regular(folded)), scores(regular(clean))).toFixed(3)}`,
  );
  const called = (set: typeof folded, verdict: Verdict): string =>
    shareText(set.filter(({ screen }) => screen?.verdict === verdict).length, set.length);
  console.log(`clean called folded: ${called(clean, 'folded')}`);
  console.log(`clean called clear: ${called(clean, 'clear')}; limited: ${called(clean, 'limited')}`);
  console.log(`folded called clear: ${called(folded, 'clear')}`);
  console.log(
    `folded called folded: ${called(folded, 'folded')}; unproven: ${called(folded, 'unproven')}; limited: ${called(folded, 'limited')}`,
  );
  reportTones(all);
  reportClearTo(all);
  reportCalibration(withScore);
  reportFamilies(withScore);
  if (values.list) listMisses(folded, clean);
}

const isFoldedTone = (explanation: string): boolean =>
  explanation.startsWith('folded') || explanation === 'movedBetweenRates';

function reportTones(all: Screened[]): void {
  let [wanted, found, reported, wrong, wrongTrue] = [0, 0, 0, 0, 0];
  for (const { truth, screen } of all) {
    if (screen === null || truth.isIrregular) continue;
    const tolerance = Math.max(2 / Math.max(screen.durationS ?? 1, 1e-6), 1e-4 * truth.sampleRateHz);
    const shown = screen.tones.filter(({ explanation, confidence }) => isFoldedTone(explanation) && confidence >= 0.95);
    const isAt = (hz: number) => shown.some(({ frequencyHz }) => Math.abs(frequencyHz - hz) <= tolerance);
    const visible = truth.foldedTones.filter(({ isVisible }) => isVisible);
    wanted += visible.length;
    found += visible.filter(({ foldedHz }) => isAt(foldedHz)).length;
    // The labels list the strongest eight: a tone beyond those is only counted as wrong where the list is complete.
    reported += shown.length;
    if (truth.foldedTones.length >= 8) continue;
    const misses = shown.filter(({ frequencyHz }) =>
      truth.foldedTones.every(({ foldedHz }) => Math.abs(frequencyHz - foldedHz) > tolerance),
    );
    wrong += misses.length;
    wrongTrue += shown.filter((tone) =>
      truth.foldedTones.some(
        (one) =>
          Math.abs(tone.frequencyHz - one.foldedHz) <= tolerance &&
          Math.abs((tone.trueFrequencyHz ?? 0) - one.trueHz) > 20 * tolerance,
      ),
    ).length;
  }
  console.log(
    `folded tones: visible ones found ${shareText(found, wanted)}; reported ${reported}, of these wrong ${wrong}, true frequency wrong ${wrongTrue}`,
  );
}

function reportClearTo(all: Screened[]): void {
  const claims = all.filter(
    ({ truth, screen }) => typeof screen?.clearToHz === 'number' && truth.bandFoldDb.length === 10,
  );
  const broken = claims.filter(({ truth, screen }) => {
    const width = truth.sampleRateHz / 20;
    return truth.bandFoldDb.some(
      (level, band) => (band + 1) * width <= (screen?.clearToHz ?? 0) && level > -(screen?.protectionDb ?? 40) + 0.5,
    );
  });
  console.log(`clear-to claims that hold: ${shareText(claims.length - broken.length, claims.length)}`);
  const clean = claims.filter(({ truth }) => truth.label === 'clean');
  const shares = clean
    .map(({ truth, screen }) => (2 * (screen?.clearToHz ?? 0)) / truth.sampleRateHz)
    .sort((a, b) => a - b);
  console.log(
    `  clear-to given on ${clean.length} clean captures, median ${((shares[shares.length >> 1] ?? 0) * 100).toFixed(0)} % of fs/2`,
  );
  for (const { truth, screen } of broken)
    console.log(`  broken: ${truth.file} ${truth.family} ${truth.operation} to ${screen?.clearToHz?.toFixed(0)} Hz`);
}

function reportCalibration(all: (Screened & { score: number })[]): void {
  const judged = all.filter(({ truth }) => truth.label === 'folded' || truth.label === 'clean');
  const edges = [0, 0.05, 0.2, 0.5, 0.8, 0.95, 1.0001];
  const rows = edges.slice(0, -1).map((from, index) => {
    const inside = judged.filter(({ score }) => score >= from && score < (edges[index + 1] as number));
    const share = inside.filter(({ truth }) => truth.label === 'folded').length / Math.max(1, inside.length);
    const mean = inside.reduce((sum, { score }) => sum + score, 0) / Math.max(1, inside.length);
    return `${mean.toFixed(2)}→${share.toFixed(2)} (${inside.length})`;
  });
  const brier =
    judged.reduce((sum, { score, truth }) => sum + (score - (truth.label === 'folded' ? 1 : 0)) ** 2, 0) /
    judged.length;
  console.log(`calibration, mean score→share folded (count): ${rows.join(', ')}; Brier ${brier.toFixed(3)}`);
}

function reportFamilies(all: (Screened & { score: number })[]): void {
  const families = [...new Set(all.map(({ truth }) => truth.family))].sort();
  for (const family of families) {
    const own = all.filter(({ truth }) => truth.family === family);
    const [f, c] = ['folded', 'clean'].map((label) => own.filter(({ truth }) => truth.label === label)) as [
      typeof all,
      typeof all,
    ];
    const calledFolded = (set: typeof all): number => set.filter(({ screen }) => screen?.verdict === 'folded').length;
    console.log(
      `  ${family.padEnd(18)} folded ${String(f.length).padStart(3)} (called folded ${calledFolded(f)}), clean ${String(c.length).padStart(3)} (called folded ${calledFolded(c)}), area ${rocArea(
        f.map(({ score }) => score),
        c.map(({ score }) => score),
      ).toFixed(3)}`,
    );
  }
}

function listMisses(folded: (Screened & { score: number })[], clean: (Screened & { score: number })[]): void {
  const line = ({ truth, screen, score }: Screened & { score: number }): string =>
    `  ${score.toFixed(3)} ${screen?.verdict ?? 'failed'} ${truth.file} ${truth.family} ${truth.operation}`;
  console.log('folded, lowest scores and all called clear:');
  const missed = [...folded].sort((a, b) => a.score - b.score);
  for (const one of missed.filter((each, index) => index < 15 || each.screen?.verdict === 'clear'))
    console.log(line(one));
  console.log('clean, highest scores and all called folded:');
  const alarms = [...clean].sort((a, b) => b.score - a.score);
  for (const one of alarms.filter((each, index) => index < 15 || each.screen?.verdict === 'folded'))
    console.log(line(one));
}

const directory = given ?? mkdtempSync(join(tmpdir(), 'overfold-bench-'));
if (given === undefined) writeSyntheticSet(directory, Number(values.seed));
try {
  report(screenAll(readLabelledSet(directory)));
} finally {
  if (given === undefined) rmSync(directory, { recursive: true, force: true });
}
