import type { Finding } from '../schemas/screening.js';
import { coherenceChance } from './coherenceChance.js';
import { formatDb, formatHz, formatPercent } from './formatNumber.js';
import type { CompanionMeasurement, FoldedBand } from './MeasurementRecord.js';

/** What the labels and the fold score mean by folded: energy over this share of the total below this part of the band. */
const materialShareDb = -40;
const countedBand = 0.9;
/** Shares under this are below what leakage between bins leaves. */
const leastShareDb = -90;

/** A share is stated only where chance, over all bands and zones tried, is below this. */
const largestChance = 1e-3;

export interface FoldedShare {
  finding: Finding;
  /** Folded power over the capture's below 0.9·fs/2, dB; null where none is shown. */
  shareDb: number | null;
  confidence: number;
  /** Largest folded power that would not have been noticed, over the capture's, dB. */
  unnoticedDb: number;
}

/**
 * Share of a capture's power that is coherent with what its companion carries beyond fs/2, band by band. Bands and zones count
 * where chance doesn't explain them, all of them tried.
 */
export function judgeFoldedShare(
  companion: CompanionMeasurement,
  bands: FoldedBand[],
  confidenceWanted: number,
): FoldedShare | null {
  const tried = bands.reduce(
    (sum, { zones }) => sum + zones.filter(({ zone, inputs }) => zone > 1 && inputs > 0).length,
    0,
  );
  if (tried === 0) return null;
  const allowed = Math.min(1 - confidenceWanted, largestChance) / tried;
  const top = countedBand * (bands[bands.length - 1]?.toHz ?? 0);
  let [shown, unnoticed, leastChance] = [0, 0, 1];
  const perBand = bands.map((band) => {
    let [folded, missed] = [0, 0];
    for (const { zone, coherence, independent, inputs, powerDb, chanceDb } of band.zones) {
      if (zone === 1 || inputs === 0) continue;
      missed += (fromDb(chanceDb) * (inputs - Math.log(allowed))) / inputs;
      const chance = coherenceChance(coherence, independent, inputs);
      if (chance < allowed && powerDb > leastShareDb) {
        folded += fromDb(powerDb);
        if (band.toHz <= top * 1.001) leastChance = Math.min(leastChance, chance);
      }
    }
    if (band.toHz <= top * 1.001) {
      shown += folded;
      unnoticed += missed;
    }
    return { ...band, foldedDb: folded > 0 ? toDb(folded / fromDb(band.powerDb)) : null };
  });
  const shareDb = shown > 0 ? toDb(shown) : null;
  const confidence = shareDb === null ? 0 : 1 - Math.min(1, leastChance * tried);
  const unnoticedDb = toDb(unnoticed);
  const worst = perBand.reduce<(typeof perBand)[number] | null>(
    (found, band) => (band.foldedDb !== null && band.foldedDb > (found?.foldedDb ?? -Infinity) ? band : found),
    null,
  );
  const isMaterial = shareDb !== null && shareDb > materialShareDb;
  const evidence: Finding['evidence'] = {
    companion: companion.name,
    companionRateHz: companion.sampleRateHz,
    unnoticedDb,
    showsNothing: shareDb === null && unnoticedDb < materialShareDb,
    ...(shareDb === null ? {} : { foldedShareDb: shareDb }),
  };
  perBand.forEach(({ foldedDb }, index) => {
    if (foldedDb !== null) evidence[`band${index + 1}FoldedDb`] = foldedDb;
  });
  const text =
    shareDb === null
      ? `Nothing that the companion ${companion.name} at ${formatHz(companion.sampleRateHz)} carries beyond this capture's folding frequency is found here; ${unnoticedDb < materialShareDb ? 'it shows no folding, down to' : 'noise would hide it up to'} ${formatDb(unnoticedDb)} of the power.`
      : `At least ${formatPercent(10 ** (shareDb / 10))} of the power (${formatDb(shareDb)}) goes along with what the companion ${companion.name} carries beyond this capture's folding frequency: it is folded` +
        (worst === null
          ? '.'
          : `; most in ${formatHz(worst.fromHz)} to ${formatHz(worst.toHz)}, where it is ${formatPercent(10 ** ((worst.foldedDb ?? 0) / 10))} of the power.`);
  return {
    shareDb,
    confidence,
    unnoticedDb,
    finding: {
      kind: 'foldedShare',
      severity: isMaterial && confidence >= confidenceWanted ? 'fold' : 'note',
      confidence: shareDb === null ? confidenceWanted : confidence,
      ...(shareDb === null || worst === null ? {} : { fromHz: worst.fromHz, toHz: worst.toHz, strengthDb: shareDb }),
      text,
      evidence,
      method:
        'multiple coherence with the companion’s zones, each folded to this rate; corrected for all bands and zones tried',
      source: 'Bendat & Piersol 2010, ch. 7; Carter 1987',
    },
  };
}

const toDb = (ratio: number): number => 10 * Math.log10(Math.max(ratio, 1e-20));
const fromDb = (level: number): number => 10 ** (level / 10);
