import type { Finding } from '../schemas/screening.js';
import { formatDb, formatHz, formatPercent } from './formatNumber.js';
import type { CompanionMeasurement, DensityPair } from './MeasurementRecord.js';

const bands = 10;
const materialShareDb = -40;
const countedBand = 0.9;
/** The prediction has to stand out of the in-band density by this somewhere, or nothing can be told. */
const leastRangeDb = 6;
/** Levels of repeated events differ by this even where nothing folds. */
const leastScatterDb = 1;
const sureSigmas = 3;
/** Slope of the measured excess over the predicted one: 1 without any filter, 0 where nothing folds. */
const leastSlope = 0.25;

export interface PredictedShare {
  finding: Finding;
  /** Folded power over the capture's below 0.9·fs/2, dB; null where none is shown. */
  shareDb: number | null;
  confidence: number;
}

/**
 * Folded density that a much faster companion predicts, cell by cell (Σ over the zones, at the sensitivity that fits where next to
 * nothing is predicted to fold), against the density measured. What is measured beyond the companion's own density at the same
 * place is folded where it follows the prediction. For repeated events: powers only.
 * @returns null where the prediction stands out nowhere, so that nothing can be told
 */
export function judgeDensities(companion: CompanionMeasurement, pair: DensityPair): PredictedShare | null {
  const count = pair.ownDb.length;
  const steps = pair.ownDb.map((level, cell) => level - (pair.sameDb[cell] as number));
  const predicted = pair.sameDb.map((level, cell) => toDb(1 + fromDb((pair.foldedDb[cell] as number) - level)));
  const order = [...predicted.keys()].sort((a, b) => (predicted[a] as number) - (predicted[b] as number));
  const quiet = order.slice(0, Math.max(4, Math.floor(count / 4))).map((cell) => steps[cell] as number);
  const gainDb = median(quiet);
  const scatterDb = Math.max(leastScatterDb, 1.4826 * median(quiet.map((step) => Math.abs(step - gainDb))));
  const range = Math.max(...predicted) - median(order.slice(0, quiet.length).map((cell) => predicted[cell] as number));
  if (!(range >= leastRangeDb)) return null;
  const { slope, error } = slopeOf(predicted, steps);
  const isFollowing = slope - sureSigmas * error > leastSlope;
  let [folded, total] = [0, 0];
  const perBand = Array.from({ length: bands }, () => ({ folded: 0, total: 0 }));
  for (let cell = 0; cell < count; cell++) {
    const density = fromDb(pair.ownDb[cell] as number);
    const beyond = (steps[cell] as number) - gainDb > sureSigmas * scatterDb;
    const part = isFollowing && beyond ? density - fromDb((pair.sameDb[cell] as number) + gainDb) : 0;
    const band = perBand[Math.min(bands - 1, Math.floor((bands * cell) / count))];
    if (band !== undefined) {
      band.folded += part;
      band.total += density;
    }
    total += density;
    if ((cell + 1) / count <= countedBand + 1e-9) folded += part;
  }
  const shareDb = folded > 0 ? toDb(folded / total) : null;
  const confidence = shareDb === null ? 0 : Math.min(0.99, 1 - Math.exp(-0.5 * (slope / Math.max(error, 1e-6)) ** 2));
  const evidence: Finding['evidence'] = {
    companion: companion.name,
    companionRateHz: companion.sampleRateHz,
    sensitivityDb: gainDb,
    scatterDb,
    slopeDbPerDb: slope,
    slopeErrorDbPerDb: error,
    ...(shareDb === null ? {} : { foldedShareDb: shareDb }),
  };
  perBand.forEach((band, index) => {
    if (band.folded > 0) evidence[`band${index + 1}FoldedDb`] = toDb(band.folded / band.total);
  });
  const compared = `the companion ${companion.name} at ${formatHz(companion.sampleRateHz)}`;
  return {
    shareDb,
    confidence,
    finding: {
      kind: 'foldedShare',
      severity: 'note',
      confidence: shareDb === null ? 0.5 : confidence,
      ...(shareDb === null ? {} : { strengthDb: shareDb }),
      text:
        shareDb === null
          ? `The density does not rise where ${compared} predicts that folding would raise it by up to ${formatDb(range)}.`
          : `The density rises as ${compared} predicts for folding: ${formatPercent(fromDb(shareDb))} of the power (${formatDb(shareDb)}) is folded.`,
      evidence,
      method: 'density predicted by folding the faster companion’s, sensitivities matched where nothing folds',
      source: 'fold arithmetic; Welch 1967',
    },
  };
}

/** Whether the share counts as folded by the label's −40 dB. */
export const isMaterialShare = ({ shareDb }: PredictedShare): boolean => shareDb !== null && shareDb > materialShareDb;

/** Least squares; neighbouring cells go together, so that a quarter of them is taken to be independent. */
function slopeOf(x: readonly number[], y: readonly number[]): { slope: number; error: number } {
  const n = x.length;
  const mean = (values: readonly number[]): number => values.reduce((sum, value) => sum + value, 0) / n;
  const [mx, my] = [mean(x), mean(y)];
  const xx = x.reduce((sum, value) => sum + (value - mx) ** 2, 0);
  const slope =
    x.reduce((sum, value, index) => sum + (value - mx) * ((y[index] as number) - my), 0) / Math.max(xx, 1e-12);
  const rest = x.reduce((sum, value, index) => sum + ((y[index] as number) - my - slope * (value - mx)) ** 2, 0);
  const error = Math.sqrt((4 * rest) / Math.max(1, n - 2) / Math.max(xx, 1e-12));
  return { slope, error };
}

function median(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  const half = sorted.length >> 1;
  return sorted.length % 2 === 1 ? (sorted[half] as number) : ((sorted[half - 1] ?? 0) + (sorted[half] ?? 0)) / 2;
}

const toDb = (ratio: number): number => 10 * Math.log10(Math.max(ratio, 1e-30));
const fromDb = (level: number): number => 10 ** (level / 10);
