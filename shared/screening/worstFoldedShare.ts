import type { ContaminationBound } from './contaminationBound.js';
import type { ProfileMeasurement } from './MeasurementRecord.js';

/**
 * Worst-case folded energy: the bound on the folded density, summed over the band of interest, over the power seen there, dB.
 * Where this is below the protection, what is folded can't matter for the band as a whole, however deep its valleys are.
 */
export function worstFoldedShareDb(
  profile: ProfileMeasurement,
  bound: ContaminationBound,
  band: [number, number],
): number {
  const { cellHz, meanDb } = profile;
  const first = Math.max(0, Math.floor(band[0] / cellHz));
  const last = Math.min(meanDb.length - 1, Math.max(first, Math.ceil(band[1] / cellHz) - 1));
  let [folded, seen] = [0, 0];
  for (let cell = first; cell <= last; cell++) {
    folded += 10 ** (bound.atDb((cell + 0.5) * cellHz) / 10);
    seen += 10 ** ((meanDb[cell] as number) / 10);
  }
  return 10 * Math.log10(Math.max(folded, 1e-40) / Math.max(seen, 1e-40));
}
