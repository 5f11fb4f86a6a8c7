import type { MeasurementRecord } from './MeasurementRecord.js';

/** What a capture whose rate was raised after sampling tells of its first recording. */
export interface OldRate {
  /** Content ends here. */
  trueBandwidthHz: number;
  /** The old folding frequency; null where only a cliff shows it. */
  foldingFrequencyHz: number | null;
  factor: number | null;
  by: 'held' | 'straight' | 'mirror' | 'cliff';
  /** Density next to the old folding frequency, the interpolator's own droop undone, dB; null without one. */
  edgeDensityDb: number | null;
}

/** An interpolator's response at the old folding frequency: sinc(1/2) and sinc²(1/2). */
const droopDb = { held: 3.92, straight: 7.84 } as const;
/** Where no end of the content shows, the usable part of a band (common practice for filters of recorders). */
const usableShare = 0.9;

/**
 * Signs that the rate was raised after sampling, the surest first: values repeated or on straight lines between every L-th;
 * a spectrum mirrored about the old folding frequency; a cliff that no filter before a converter makes. Null without any.
 */
export function oldRate(record: MeasurementRecord): OldRate | null {
  const { edge, profile } = record;
  if (edge === null || profile === null) return null;
  const raised = edge.raised ?? null;
  if (raised !== null) {
    return {
      trueBandwidthHz: raised.contentToHz ?? usableShare * raised.pivotHz,
      foldingFrequencyHz: raised.pivotHz,
      factor: raised.factor,
      by: raised.by,
      edgeDensityDb: raised.edgeDensityDb + droopDb[raised.by],
    };
  }
  const mirror = edge.mirror;
  if (
    mirror !== null &&
    mirror.correlation > 0.95 &&
    mirror.correlation - mirror.runnerUp > 0.15 &&
    mirror.imageDb < 0
  ) {
    return {
      trueBandwidthHz: usableShare * mirror.pivotHz,
      foldingFrequencyHz: mirror.pivotHz,
      factor: mirror.factor,
      by: 'mirror',
      edgeDensityDb: null,
    };
  }
  const cliff = edge.cliff ?? null;
  if (cliff === null || !fitsWholeFactor(cliff.edgeHz / (profile.cellHz * profile.meanDb.length || 1))) return null;
  return { trueBandwidthHz: cliff.edgeHz, foldingFrequencyHz: null, factor: null, by: 'cliff', edgeDensityDb: null };
}

/** A filter's edge stands between these shares of the old folding frequency. */
const edgeShares = { from: 0.82, to: 1 } as const;
const highestFactor = 8;

/** Whether a cliff at this share of fs/2 is where an L-fold raised rate puts it; elsewhere it may be the source's own end. */
function fitsWholeFactor(share: number): boolean {
  for (let factor = 2; factor <= highestFactor; factor++) {
    if (share * factor >= edgeShares.from && share * factor <= edgeShares.to) return true;
  }
  return false;
}
