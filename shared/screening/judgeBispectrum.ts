import type { Thresholds } from '../schemas/thresholds.js';
import type { FoldEvidence } from './FoldEvidence.js';
import { formatPercent } from './formatNumber.js';
import type { MeasurementRecord } from './MeasurementRecord.js';

const nothing: FoldEvidence = { tones: [], findings: [], logRatio: 0, shownConfidence: 0 };
/** Beyond this chance of change over time the test's own assumption does not hold. */
const leastStationaryChance = 0.01;

/**
 * Supporting evidence only: a note, never a verdict, and no weight in the fold score. In stationary noise that is skewed, the
 * bispectrum of samples without aliasing vanishes in the outer triangle; energy there shows folding or a capture that is
 * not stationary. A bispectrum of zero proves nothing.
 */
export function judgeBispectrum({ bispectrum }: MeasurementRecord, thresholds: Thresholds): FoldEvidence {
  const outer = bispectrum?.outer ?? null;
  if (bispectrum === undefined || bispectrum === null || outer === null) return nothing;
  const isShown = 1 - outer.chance >= thresholds.confidence;
  if (!isShown) return nothing;
  const isStationary = (bispectrum.stationaryChance ?? 0) >= leastStationaryChance;
  return {
    ...nothing,
    findings: [
      {
        kind: 'outerTriangle',
        severity: 'note',
        confidence: Math.min(0.999, 1 - outer.chance),
        text: isStationary
          ? `Triples of frequencies hang together that can do so only by way of the sampling rate (chance in steady noise without folding: ${formatPercent(outer.chance)}): supports folded energy, and proves nothing alone.`
          : `Triples of frequencies hang together that can do so only by way of the sampling rate, but the capture is not steady over time, which has the same effect: no support either way.`,
        evidence: {
          outerStatistic: outer.statistic,
          outerChance: outer.chance,
          innerChance: bispectrum.inner?.chance ?? 1,
          stationaryChance: bispectrum.stationaryChance ?? 0,
          cells: outer.cells,
          blocks: bispectrum.blocks,
        },
        method: 'bispectrum in the outer triangle against surrogates',
        source: 'Hinich & Wolinsky 1988; Hinich & Messer 1995',
      },
    ],
  };
}
