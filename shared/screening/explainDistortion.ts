import type { Finding, Tone } from '../schemas/screening.js';
import { aliasHz } from './foldArithmetic.js';
import { isFoldedTone } from './FoldEvidence.js';
import { formatHz } from './formatNumber.js';
import { matchSigmas, toneErrorHz } from './harmonicFamily.js';
import type { IntegrityMeasurement, MeasurementRecord, ToneMeasurement } from './MeasurementRecord.js';

/** Flat tops of a few samples leave harmonics about as many times as high as a period holds them. */
const highestMultiple = 41;
const strongestTones = 3;
const leastConfidence = 0.9;
/** As judged elsewhere: fewer steps than this and rounding is no longer noise (Bennett 1948). */
const coarseStepsPerDeviation = 8;
const placesListed = 4;

/**
 * Distortion after sampling (clipping by numbers, coarse rounding) makes harmonics of what the samples hold, also beyond
 * fs/2, and they fold: a folded place of the strongest tones' harmonics then says nothing about a source. Takes such tones
 * out of the folded ones, in place, and says which they are. Not where the clipped stretches could be left out of the
 * spectra: what still stands there is no clipping. Rounding explains nothing above its own power, q²/12.
 */
export function explainDistortion(
  tones: Tone[],
  measured: ToneMeasurement[],
  record: MeasurementRecord,
  sampleRateHz: number,
  binHz: number,
): Finding[] {
  const { integrity } = record;
  const isClipped = integrity.clippedRuns > 0 && !record.damageLeftOut;
  const roundingDb = roundingPowerDb(integrity);
  if (!isClipped && roundingDb === null) return [];
  const ceilingDb = isClipped ? Infinity : (roundingDb ?? -Infinity);
  const cause = isClipped ? 'clipping' : 'rounding';
  const strongest = [...measured.keys()]
    .sort((a, b) => (measured[b]?.levelDb ?? 0) - (measured[a]?.levelDb ?? 0))
    .slice(0, strongestTones);
  const explained: Tone[] = [];
  tones.forEach((tone, index) => {
    if (tone.levelDb > ceilingDb || strongest.includes(index)) return;
    const isFolded = isFoldedTone(tone) && tone.explanation !== 'movedBetweenRates';
    if (!isFolded && tone.explanation !== 'unexplained') return;
    const place = foldedHarmonicOf(measured, index, strongest, sampleRateHz, binHz);
    if (place === null && tone.explanation !== 'foldedHarmonic') return;
    if (place !== null && !isFolded && 1 - place.chance < leastConfidence) return;
    const by = place === null ? (tone.explainedBy ?? '') : `${place.multiple} × ${formatHz(place.ofHz)}`;
    const chance = place?.chance ?? tone.chanceProbability ?? 1;
    tone.explanation = 'harmonic';
    delete tone.trueFrequencyHz;
    Object.assign(tone, { confidence: 1 - chance, chanceProbability: chance, explainedBy: `${cause}: ${by}, folded` });
    explained.push(tone);
  });
  return explained.length === 0 ? [] : [distortionFinding(explained, cause, integrity)];
}

/** Power of rounding by one step q, dB; null where the signal moves over enough steps for rounding to be noise. */
function roundingPowerDb({ quantum, stepsPerDeviation }: IntegrityMeasurement): number | null {
  if (quantum === null || stepsPerDeviation === null || stepsPerDeviation >= coarseStepsPerDeviation) return null;
  return 10 * Math.log10((quantum * quantum) / 12);
}

function foldedHarmonicOf(
  measured: ToneMeasurement[],
  index: number,
  strongest: number[],
  sampleRateHz: number,
  binHz: number,
): { multiple: number; ofHz: number; chance: number } | null {
  const tone = measured[index] as ToneMeasurement;
  for (const host of strongest) {
    const { frequencyHz } = measured[host] as ToneMeasurement;
    const hostErrorHz = toneErrorHz(measured[host] as ToneMeasurement, binHz);
    for (let multiple = 2; multiple <= highestMultiple; multiple++) {
      const trueHz = multiple * frequencyHz;
      if (trueHz < sampleRateHz / 2) continue;
      const toleranceHz = matchSigmas * Math.hypot(toneErrorHz(tone, binHz), multiple * hostErrorHz);
      if (Math.abs(aliasHz(trueHz, sampleRateHz) - tone.frequencyHz) > toleranceHz) continue;
      const tried = multiple * strongest.length;
      return { multiple, ofHz: frequencyHz, chance: 1 - Math.exp((-4 * toleranceHz * tried) / sampleRateHz) };
    }
  }
  return null;
}

function distortionFinding(tones: Tone[], cause: 'clipping' | 'rounding', integrity: IntegrityMeasurement): Finding {
  const places = tones
    .slice(0, placesListed)
    .map(({ frequencyHz }) => formatHz(frequencyHz))
    .join(', ');
  const count = tones.length === 1 ? 'One tone stands' : `${tones.length} tones stand`;
  return {
    kind: 'clippingHarmonics',
    severity: 'limit',
    confidence: Math.max(...tones.map(({ confidence }) => confidence)),
    frequencyHz: tones[0]?.frequencyHz ?? 0,
    text:
      `${count} where folded harmonics of the strongest tones land (${places}${tones.length > placesListed ? ', …' : ''}). ` +
      (cause === 'clipping'
        ? 'Samples that are clipped make such harmonics, so they are not held against the source. Record with more headroom.'
        : 'Rounding to few steps makes such harmonics, so they are not held against the source. Record with more gain or more bits.'),
    evidence: {
      tonesCount: tones.length,
      ...(cause === 'clipping'
        ? { clippedShare: integrity.clippedShare }
        : { stepsPerDeviation: integrity.stepsPerDeviation ?? 0 }),
    },
    method: 'folded places of the harmonics of the strongest tones',
    source: cause === 'clipping' ? 'fold arithmetic' : 'Bennett 1948; fold arithmetic',
  };
}
