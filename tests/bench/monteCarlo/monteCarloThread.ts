import type { FindingKind } from '../../../shared/schemas/screening.js';
import { defaultThresholds } from '../../../shared/schemas/thresholds.js';
import { judgeChannel } from '../../../shared/screening/judgeChannel.js';
import { measureCapture } from '../../../worker/measure/measureCapture.js';
import { memorySource } from '../../support/memorySource.js';
import { seededRandom } from '../../../worker/dsp/seededRandom.js';
import { gaussian } from '../synthetic/drawing.js';
import { fisherBoundHz } from './fisherBoundHz.js';
import type { MonteCarloResult, MonteCarloTask } from './MonteCarloTask.js';
import { noiseCases, noiseRateHz } from './noiseCases.js';
import { caseFrames, caseRateHz, toneCases } from './toneCases.js';
import { toneValue } from './ToneModel.js';

/** Kinds that speak of folding: the others are no alarm. */
const alarmKinds: readonly FindingKind[] = [
  ...(['foldedTone', 'foldedOrder', 'reflectedSweep', 'ambiguousFold', 'edgeFollowsSource', 'foldedShare'] as const),
  ...(['outerTriangle', 'methodsDisagree', 'rateRaised'] as const),
];

/** Entry of a computing thread: runs one case with fresh noise each time, through the engine as captures go through it. */
export function monteCarloThread({ what, index, runs, seed }: MonteCarloTask): MonteCarloResult {
  const random = seededRandom(seed);
  const result: MonteCarloResult = { tones: 0, missed: 0, squares: 0, kinds: {}, calledFolded: 0 };
  for (let run = 0; run < runs; run++) {
    if (what === 'tones') runTones(index, random, result);
    else runNoise(index, random, result);
  }
  return result;
}

function runTones(index: number, random: () => number, result: MonteCarloResult): void {
  const { draw, signalToNoiseDb } = toneCases[index] as (typeof toneCases)[number];
  const tones = draw(random);
  const deviation = Math.sqrt(0.5 * 10 ** (-signalToNoiseDb / 10));
  const samples = gaussian(random, caseFrames).map(
    (value, n) => deviation * value + tones.reduce((sum, tone) => sum + toneValue(tone, n / caseRateHz), 0),
  );
  const bounds = fisherBoundHz(tones, caseFrames, caseRateHz, deviation);
  const found = measureCapture(memorySource([samples], caseRateHz), {})[0]?.record.tones ?? [];
  tones.forEach(({ frequencyHz }, n) => {
    const errorHz = Math.min(...found.map((one) => Math.abs(one.frequencyHz - frequencyHz)));
    result.tones++;
    // Half a bin is dozens of bounds away: that is another peak, or none.
    if (errorHz < caseRateHz / caseFrames / 2) result.squares += (errorHz / (bounds[n] as number)) ** 2;
    else result.missed++;
  });
}

function runNoise(index: number, random: () => number, result: MonteCarloResult): void {
  const { draw } = noiseCases[index] as (typeof noiseCases)[number];
  const record = measureCapture(memorySource([draw(random)], noiseRateHz), {})[0]?.record;
  if (record === undefined) return;
  const { verdict, findings } = judgeChannel(record, defaultThresholds, {});
  if (verdict === 'folded') result.calledFolded++;
  const sure = findings.filter(
    ({ kind, confidence }) => alarmKinds.includes(kind) && confidence >= defaultThresholds.confidence,
  );
  for (const kind of new Set(sure.map((finding) => finding.kind))) result.kinds[kind] = (result.kinds[kind] ?? 0) + 1;
}

export default monteCarloThread;
