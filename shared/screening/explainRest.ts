import type { Tone } from '../schemas/screening.js';
import { formatHz } from './formatNumber.js';
import { matchSigmas, toneErrorHz } from './harmonicFamily.js';
import type { ToneMeasurement } from './MeasurementRecord.js';

const leastConfidence = 0.9;
/** A product of two tones is weaker than both by at least this much. */
const weakerByDb = 10;
/** Sums and differences up to the second multiple of each: what a weak square or cube makes. */
const products: readonly [number, number][] = [
  [1, 1],
  [1, -1],
  [2, -1],
  [2, 1],
  [1, -2],
  [1, 2],
];

/**
 * What nothing else explains. Sums and differences of the two strongest tones where one stands within its tolerance and that
 * is unlikely by chance; every other tone keeps the chance that noise gives a peak as high anywhere in the capture (a
 * periodogram's bin in noise is exponentially distributed: Kay 1993).
 * @param binCount independent bins of the capture: half its samples
 */
export function explainRest(tones: Tone[], measured: ToneMeasurement[], binHz: number, binCount: number): void {
  const [first, second] = [...measured].sort((a, b) => b.levelDb - a.levelDb);
  tones.forEach((tone, index) => {
    if (tone.explanation !== 'unexplained') return;
    const own = measured[index] as ToneMeasurement;
    tone.chanceProbability = Math.min(1, binCount * Math.exp(-(10 ** (own.standsOutDb / 10))));
    if (first === undefined || second === undefined || own.levelDb > second.levelDb - weakerByDb) return;
    for (const [a, b] of products) {
      const placeHz = Math.abs(a * first.frequencyHz + b * second.frequencyHz);
      const toleranceHz =
        matchSigmas *
        Math.hypot(toneErrorHz(own, binHz), a * toneErrorHz(first, binHz), b * toneErrorHz(second, binHz));
      if (Math.abs(placeHz - own.frequencyHz) > toleranceHz) continue;
      const chance = Math.min(1, products.length * (1 - Math.exp(-2 * toleranceHz * own.peaksPerHz)));
      if (1 - chance < leastConfidence) return;
      const sign = b < 0 ? '−' : '+';
      Object.assign(tone, {
        explanation: 'harmonic',
        confidence: 1 - chance,
        chanceProbability: chance,
        explainedBy: `intermodulation: ${a} × ${formatHz(first.frequencyHz)} ${sign} ${Math.abs(b)} × ${formatHz(second.frequencyHz)}`,
      } satisfies Partial<Tone>);
      return;
    }
  });
}
