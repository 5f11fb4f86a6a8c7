import type { ChannelJudgement, Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { ContaminationBound } from './contaminationBound.js';
import type { FoldFeatures } from './foldFeatures.js';
import { formatDb, formatHz, formatPercent } from './formatNumber.js';
import type { MeasurementRecord } from './MeasurementRecord.js';
import { normalQuantile } from './normalQuantile.js';
import { oldRate } from './oldRate.js';
import { rateRaised } from './rateRaised.js';

/** Below this in-band range the level over time can say nothing about the edge. */
const leastRangeDb = 6;
/** At this distance of the edge to total power folded energy counts (what the fold score means). */
const overSampledShare = 0.6;
/** An edge this close to the floor is the floor. */
const nearFloorDb = 3;

export type BandEdge = ChannelJudgement['bandEdge'];

/** Skirt depth, edge over floor and guard share, dB; null where they can't be formed. */
export function bandEdgeFigures(
  record: MeasurementRecord,
  thresholds: Thresholds,
  band: [number, number],
  noiseFloorDb: number | undefined,
): BandEdge {
  const { profile, edge, integrity, sampleRateHz } = record;
  if (profile === null || edge === null || sampleRateHz === null)
    return { skirtDb: null, edgeAboveFloorDb: null, guardShareDb: null };
  const density = profile.tonelessDb.map((level) => 10 ** (level / 10));
  const power = profile.meanDb.map((level) => 10 ** (level / 10));
  const cell = (frequencyHz: number): number =>
    Math.min(density.length - 1, Math.max(0, Math.floor(frequencyHz / profile.cellHz)));
  const inband = density.slice(cell(band[0]), cell(Math.max(band[0], band[1])) + 1);
  const inbandDb = 10 * Math.log10(inband.reduce((sum, value) => sum + value, 0) / inband.length);
  const guard = power.slice(cell((thresholds.guardStart * sampleRateHz) / 2)).reduce((sum, value) => sum + value, 0);
  const total = power.reduce((sum, value) => sum + value, 0);
  const floors = [integrity.quantisationFloorDb, noiseFloorDb ?? null].filter((floor) => floor !== null);
  return {
    skirtDb: inbandDb - edge.densityDb,
    edgeAboveFloorDb: floors.length === 0 ? null : edge.densityDb - Math.max(...floors),
    guardShareDb: 10 * Math.log10(Math.max(guard, 1e-40) / Math.max(total, 1e-40)),
  };
}

/** Findings at the band edge: unprotected, no roll-off, follows the source, images of a raised rate, over-sampled. */
export function judgeEdge(
  record: MeasurementRecord,
  thresholds: Thresholds,
  given: {
    bandEdge: BandEdge;
    bound: ContaminationBound;
    features: FoldFeatures;
    foldConfidence: number;
    isDamaged: boolean;
    isProtected: boolean;
  },
): Finding[] {
  const { edge, sampleRateHz } = record;
  if (edge === null || sampleRateHz === null) return [];
  const { bandEdge, bound, features, foldConfidence } = given;
  const place = { fromHz: edge.fromHz, toHz: edge.toHz };
  const findings: Finding[] = [];
  const { skirtDb, guardShareDb, edgeAboveFloorDb } = bandEdge;
  const isAtFloor = edgeAboveFloorDb !== null && edgeAboveFloorDb < nearFloorDb;
  const old = oldRate(record);
  if (old !== null) findings.push(rateRaised(old, sampleRateHz));
  const follows = edge.follows;
  if (follows !== null && follows.slopeError > 0 && !features.hasImages && !given.isDamaged) {
    const sigmas = follows.slope / follows.slopeError;
    const isSignificant =
      sigmas > normalQuantile(Math.min(0.9999, thresholds.confidence)) && follows.inbandRangeDb >= leastRangeDb;
    const isSubstantial = guardShareDb !== null && guardShareDb > thresholds.maxGuardShareDb;
    if (isSignificant && isSubstantial && foldConfidence >= thresholds.confidence) {
      findings.push({
        kind: 'edgeFollowsSource',
        severity: 'fold',
        confidence: Math.min(foldConfidence, 0.999),
        ...place,
        strengthDb: features.edgeShareDb,
        text: `The level next to the folding frequency rises and falls with the signal (${sigmas.toFixed(1)} standard errors over an in-band range of ${formatDb(follows.inbandRangeDb)}) and carries ${formatDb(features.edgeShareDb)} of the total power if spread over the band: the signal goes on beyond ${formatHz(sampleRateHz / 2)} and is folded.`,
        evidence: {
          sigmas,
          slope: follows.slope,
          frames: follows.frames,
          inbandRangeDb: follows.inbandRangeDb,
          edgeShareDb: features.edgeShareDb,
          followingShareDb: follows.followingShareDb ?? -100,
          cliffDb: features.cliffDb,
        },
        method: 'edge level over in-band level, frame by frame, weighted least squares; edge level over total power',
      });
    }
  }
  if (
    guardShareDb !== null &&
    skirtDb !== null &&
    (guardShareDb > thresholds.maxGuardShareDb || skirtDb < thresholds.minSkirtDb) &&
    !features.hasImages
  ) {
    findings.push({
      kind: 'bandEdgeUnprotected',
      // Energy in the guard band alone does not limit what the bound protects; a missing skirt does, unless the edge is that
      // far below all the power there is.
      severity:
        given.isProtected && Math.max(skirtDb, -features.edgeShareDb) >= thresholds.minSkirtDb ? 'note' : 'limit',
      confidence: foldConfidence,
      ...place,
      strengthDb: guardShareDb,
      text: `The guard band from ${formatHz((thresholds.guardStart * sampleRateHz) / 2)} holds ${formatPercent(10 ** (guardShareDb / 10))} of the power (${formatDb(guardShareDb)}; limit ${thresholds.maxGuardShareDb} dB) and the density falls by ${formatDb(skirtDb)} towards the edge (at least ${thresholds.minSkirtDb} dB asked for).`,
      evidence: { guardShareDb, skirtDb, limitDb: thresholds.maxGuardShareDb, minSkirtDb: thresholds.minSkirtDb },
      method: 'Welch density, share above the guard start',
      source: 'Welch 1967',
    });
  }
  findings.push({
    kind: 'contaminationBound',
    severity: 'note',
    confidence: thresholds.confidence,
    ...place,
    strengthDb: bound.edgeUpperDb,
    text: `Folded energy is at most ${formatDb(bound.edgeUpperDb)} per Hz anywhere in the band${bound.usesFilter ? ', less what the stated filter takes off' : ''}, provided that ${bound.assumption}.`,
    evidence: {
      edgeDensityDb: edge.densityDb,
      edgeUpperDb: bound.edgeUpperDb,
      relativeError: edge.relativeError,
      usesFilter: bound.usesFilter,
    },
    method: 'density next to fs/2, all zones together',
  });
  if (isAtFloor || features.floorLikeness > 0.5) {
    findings.push({
      kind: 'noiseFloorLimits',
      severity: 'note',
      confidence: isAtFloor ? 0.95 : Math.min(0.95, features.floorLikeness),
      ...place,
      text: `The upper half of the band is a flat, steady floor${edgeAboveFloorDb === null ? '' : `, ${formatDb(edgeAboveFloorDb)} over the quantisation floor`}: noise of sensor or converter, or folded noise; the capture can't tell which, and the floor caps what can be cleared.`,
      evidence: { floorLikeness: features.floorLikeness, ...(edgeAboveFloorDb === null ? {} : { edgeAboveFloorDb }) },
      method: 'flatness over frequency, steadiness over time',
    });
  }
  // A cliff elsewhere than an L-fold raised rate puts it is the end of the content, and no reason to limit anything.
  const endHz = edge.cliff?.edgeHz ?? edge.occupiedToHz;
  if (old === null && endHz < (overSampledShare * sampleRateHz) / 2) {
    findings.push({
      kind: 'overSampled',
      severity: 'note',
      confidence: 0.9,
      frequencyHz: endHz,
      text: `Above ${formatHz(endHz)} there is next to nothing: the true bandwidth is about that, and a lower rate would do.`,
      evidence: { trueBandwidthHz: endHz, occupiedToHz: edge.occupiedToHz, foldingFrequencyHz: sampleRateHz / 2 },
      method: edge.cliff
        ? 'fall of the smoothed density within a twelfth of the frequency'
        : 'Welch density, smoothed, 60 dB below its highest value',
      source: 'Welch 1967',
    });
  }
  return findings;
}
