import type { Finding, Tone } from '../schemas/screening.js';
import { zoneOf } from './foldArithmetic.js';
import { formatDb, formatHz, formatPercent } from './formatNumber.js';

const why: Partial<Record<Tone['explanation'], string>> = {
  foldedHarmonic: 'it fits the folded harmonics of the family seen in band',
  foldedSource: 'a stated source folds to this place',
  foldedOrder: 'it moves with the shaft the wrong way, as a folded order does',
  movedBetweenRates: 'it stands elsewhere in the companion capture at another rate',
};

/** The finding of a tone that is shown to be folded: its sentence, numbers, method and source. */
export function foldedToneFinding(tone: Tone, sampleRateHz: number): Finding {
  const trueHz = tone.trueFrequencyHz;
  const belongs =
    trueHz === undefined ? '' : ` and belongs at ${formatHz(trueHz)} (zone ${zoneOf(trueHz, sampleRateHz).number})`;
  const by = tone.explainedBy === undefined ? '' : ` (${tone.explainedBy})`;
  const chance = tone.chanceProbability ?? 1 - tone.confidence;
  return {
    kind: 'foldedTone',
    severity: 'fold',
    confidence: tone.confidence,
    frequencyHz: tone.frequencyHz,
    ...(trueHz === undefined ? {} : { trueFrequencyHz: trueHz }),
    strengthDb: tone.levelDb,
    text: `The tone at ${formatHz(tone.frequencyHz)}, ${formatDb(tone.standsOutDb)} over its surroundings, is folded${belongs}: ${why[tone.explanation] ?? 'its place fits a source beyond the folding frequency'}${by}. Chance of such a match: ${formatPercent(chance)}.`,
    evidence: {
      frequencyHz: tone.frequencyHz,
      uncertaintyHz: tone.uncertaintyHz,
      standsOutDb: tone.standsOutDb,
      chanceProbability: chance,
      sampleRateHz,
    },
    method: 'place of the tone against predicted fold places, corrected for all places tried',
    source: 'fold arithmetic; Rife & Boorstyn 1974',
  };
}
