import type { OrderMeasurement } from './OrderMeasurement.js';

/**
 * What the worker measured on one channel: everything the judge needs and nothing that depends on a threshold.
 * Plain JSON: no NaN, no Infinity, no typed arrays. Unless a name ends in another unit, levels are in dB re
 * 1 (full scale or unit)², densities in dB re 1 (full scale or unit)²/Hz, one-sided; frequencies in Hz; times in s.
 * `null` means "could not be measured"; the reason is in `obstacles`.
 */
export interface MeasurementRecord {
  version: 1;
  channel: number;
  channelName: string;
  unit: string;
  format: 'wav' | 'csv';
  /** Uniform or mean rate after the sheet, the header and the time stamps. */
  sampleRateHz: number | null;
  /** What the file itself says, before the sheet. */
  headerRateHz: number | null;
  samples: number;
  durationS: number | null;
  /** Why parts of the record are missing. */
  obstacles: MeasurementObstacle[];
  warnings: { code: string; message: string }[];
  level: LevelMeasurement | null;
  integrity: IntegrityMeasurement;
  timeStamps: TimeStampMeasurement | null;
  profile: ProfileMeasurement | null;
  edge: EdgeMeasurement | null;
  /** Damaged stretches (clipping, dropouts, gaps) are left out of the spectra, and the rest was enough for them. */
  damageLeftOut: boolean;
  tones: ToneMeasurement[];
  irregular: IrregularMeasurement | null;
  companion: CompanionMeasurement | null;
  /** Missing in records of older engines. */
  bispectrum?: BispectrumMeasurement | null;
  /** Orders and sweeps by stretch; missing in older records, null where the channel is too short, irregular or silent. */
  orders?: OrderMeasurement[] | null;
}

/** Bispectral test: triples of frequencies that add up within the band (inner) or only by way of fs (outer). */
export interface BispectrumMeasurement {
  /** Why it was not run; null where it was. */
  notRun: 'tooShort' | 'damaged' | 'coarse' | 'transient' | 'tonal' | 'moreChannels' | null;
  blocks: number;
  outer: { statistic: number; cells: number; chance: number } | null;
  inner: { statistic: number; cells: number; chance: number } | null;
  /** Chance that stationary noise changes as much over the capture. */
  stationaryChance: number | null;
}

export type MeasurementObstacle = 'rateUnknown' | 'tooFewSamples' | 'silent' | 'notFinite' | 'irregularStamps';

/** Amplitude statistics over all finite samples. */
export interface LevelMeasurement {
  mean: number;
  rms: number;
  minimum: number;
  maximum: number;
  /** Power about the mean, dB. */
  powerDb: number;
  /** Fourth moment over squared variance; 3 for Gaussian noise. */
  kurtosis: number;
}

export interface SpanS {
  fromS: number;
  toS: number;
}

export interface IntegrityMeasurement {
  notFiniteCount: number;
  clippedCount: number;
  clippedShare: number;
  clippedRuns: number;
  /** The longest runs first, at most 16. */
  clippedSpans: SpanS[];
  clipsBelowFullScale: boolean;
  missingShare: number;
  dropoutCount: number;
  dropouts: SpanS[];
  /** Stretches at rest: silence at the start, at the end, or in pauses into which the signal fades. The longest first. */
  pauses: SpanS[];
  pauseCount: number;
  pauseShare: number;
  offsetShare: number;
  /** The step between neighbouring codes really used; null where none shows. */
  quantum: number | null;
  /** log2 of the used range in steps; null without a quantum. */
  usedBits: number | null;
  nominalBits: number | null;
  /** Standard deviation of the signal over the step. */
  stepsPerDeviation: number | null;
  /** Bennett's floor q²/(6·fs) as a one-sided density, dB. */
  quantisationFloorDb: number | null;
}

export interface TimeStampMeasurement {
  irregular: boolean;
  jitterShare: number;
  missingShare: number;
  gaps: SpanS[];
  repeatedCount: number;
  roundingStepS: number;
}

/** The survey spectrum pooled into equal cells from 0 to fs/2: what clear-to, guard share and pictures need. */
export interface ProfileMeasurement {
  cellHz: number;
  resolutionHz: number;
  segments: number;
  /** Independent averages behind each mean: segments thinned by their overlap. */
  effectiveSegments: number;
  /** Mean density per cell, everything included. */
  meanDb: number[];
  /** Mean density per cell without the tones. */
  tonelessDb: number[];
  /** Bias-corrected median density per cell: for noise floors only. */
  medianDb: number[];
}

export interface EdgeMeasurement {
  /** Stretch over which the edge is measured. */
  fromHz: number;
  toHz: number;
  /** Mean density, tones taken out. */
  densityDb: number;
  /** The same with everything left in. */
  densityWithTonesDb: number;
  /** Standard error of the mean density over the mean density (linear), from the spread between frames. */
  relativeError: number;
  /** Largest frame's edge density over the mean, dB: how bursty the edge is. */
  burstDb: number;
  kurtosis: number;
  follows: EdgeFollowsMeasurement | null;
  /** Deepest fall of the smoothed density within fs/20, dB (positive = falls), and where it starts. */
  steepestFallDb: number;
  steepestFallHz: number;
  /** Fall of the smoothed density from the top of the band of plenty to the edge, dB. */
  fallToEdgeDb: number;
  /** Where the smoothed density leaves the strongest cell's level minus 60 dB for good. */
  occupiedToHz: number;
  mirror: MirrorMeasurement | null;
  /** The rate was raised by repeating values or by straight lines, told from the samples themselves. */
  raised: RaisedMeasurement | null;
  /** The lowest cliff steeper than a filter in front of a converter can be. */
  cliff: { edgeHz: number; depthDb: number } | null;
}

export interface RaisedMeasurement {
  factor: number;
  by: 'held' | 'straight';
  /** Share of the samples between the old ones that follow the rule. */
  followingShare: number;
  /** The old folding frequency. */
  pivotHz: number;
  /** Where the content ends below it; null where it does not end. */
  contentToHz: number | null;
  /** Mean density next to the old folding frequency, dB. */
  edgeDensityDb: number;
}

/** edge(t) = floor + slope·inband(t), least squares over frames. */
export interface EdgeFollowsMeasurement {
  frames: number;
  slope: number;
  slopeError: number;
  floorDb: number | null;
  inbandRangeDb: number;
  correlation: number;
  /** Share of the edge's mean power that the slope explains, dB; null when the slope is not positive. */
  followingShareDb: number | null;
}

/** Images mirrored about a pivot below fs/2: the mark of a rate raised by repetition or linear interpolation. */
export interface MirrorMeasurement {
  /** The old folding frequency: fs/2 over the factor. */
  pivotHz: number;
  /** How many times the rate was raised. */
  factor: number;
  correlation: number;
  /** Highest correlation about any other pivot: a comb of harmonics is mirrored about many. */
  runnerUp: number;
  /** Level of the mirrored stretch against its original, dB. */
  imageDb: number;
}

export interface ToneMeasurement {
  frequencyHz: number;
  /** Cramér-Rao bound on the standard deviation of the frequency. */
  boundHz: number;
  /** Wander of the tone over the capture, as a standard deviation; 0 where it can't be told from the bound. */
  wanderHz: number;
  levelDb: number;
  standsOutDb: number;
  floorDb: number;
  /** Peaks per Hz around the tone: the density behind the chance of a match. */
  peaksPerHz: number;
  /** The amplitude falls as exp(−decayPerS·t); missing for a steady tone. */
  decayPerS?: number;
  /**
   * Phase against a steady tone in equal parts of the capture, straight line taken out; `errorRad` is the standard deviation
   * of one part. Kept where some tone of the channel shows a wander.
   */
  phaseTrack?: { phasesRad: number[]; errorRad: number };
}

export interface IrregularMeasurement {
  meanRateHz: number;
  /** Highest frequency that the time stamps can tell apart from its images. */
  reachHz: number;
  limitedBy: 'grid' | 'stampError' | 'sensorBand' | 'budget';
  tones: IrregularTone[];
  /** Power of the samples about their mean, dB. Missing in older records, like all that follows. */
  totalDb?: number;
  /** Law of the highest peak, over its surroundings, when the samples are dealt out to the times at random. */
  falseAlarm?: { shuffles: number; location: number; scale: number };
  /** What lies beyond half the mean rate beside the tones; null where the stamps can't tell. */
  beyond?: BeyondHalfMeasurement | null;
}

/** Powers of what the tones leave, as shares of the whole power, dB. */
export interface BeyondHalfMeasurement {
  /** The share reaches from half the mean rate to here. */
  toHz: number;
  /** Beyond half the mean rate, above what is the same at all frequencies. */
  beyondDb: number;
  /** Its standard error, as a share of the whole power, dB. */
  errorDb: number;
  /** The same density everywhere: noise of the converter, or a signal that can't be told from it. */
  flatDb: number;
  /** Natural logarithm of how much likelier held-out stretches are with content beyond half the mean rate than without. */
  heldOutLogRatio: number;
}

export interface IrregularTone {
  frequencyHz: number;
  uncertaintyHz: number;
  levelDb: number;
  standsOutDb: number;
  /** Natural logarithm of the chance that noise alone gives a peak this high anywhere searched. */
  logFalseAlarm: number;
  /** How much the held-out samples' residual falls by this tone, dB. */
  heldOutGainDb: number;
  /** The best other frequency in this tone's place; null where there is none. Missing in older records. */
  rivalHz?: number | null;
  /** Natural logarithm of how much likelier the samples are with the tone than with its rival. */
  rivalLogRatio?: number | null;
}

export interface CompanionMeasurement {
  name: string;
  sampleRateHz: number;
  durationS: number;
  tones: ToneMeasurement[];
  /** Missing in older records; null where the captures are too short to be compared. */
  alignment?: CompanionAlignment | null;
  /** Where each tone of this capture would stand in the companion, and what stands there. Missing in older records. */
  moves?: ToneMove[];
  /** Folded energy by coherence with what the companion carries beyond this capture's fs/2; null where not aligned. */
  folded?: FoldedBand[] | null;
  /** Densities of both, where the companion is much faster and they can't be aligned. */
  densities?: DensityPair | null;
}

/** Mean densities in equal cells of 0 … fs/2, dB. */
export interface DensityPair {
  cellHz: number;
  /** Zones of this capture that the companion shows whole. */
  zones: number;
  ownDb: number[];
  /** The companion's at the same place. */
  sameDb: number[];
  /** The companion's summed over all places that would fold there. */
  foldedDb: number[];
}

/** A tenth of 0 … fs/2 and what each zone of the companion accounts for in it. */
export interface FoldedBand {
  fromHz: number;
  toHz: number;
  /** Share of this band in the capture's power, dB. */
  powerDb: number;
  /** Zone 1 (what is not folded) first. */
  zones: FoldedZone[];
}

export interface FoldedZone {
  zone: number;
  /** Share of what the lower zones leave, cells weighted to equal level, that this zone accounts for: partial coherence. */
  coherence: number;
  /** Independent cells of time and frequency behind it. */
  independent: number;
  /** Transfers fitted; 0 where the zone can't be told from lower ones. */
  inputs: number;
  /** Power of what comes from this zone over the capture's power, dB, without what chance explains. */
  powerDb: number;
  /** The same of what chance alone would give on average: the measure of what can be noticed. */
  chanceDb: number;
}

/** The companion's clock against this capture's: what happens here at t happens there at clockRatio·t + lag. */
export interface CompanionAlignment {
  lagS: number;
  /** Standard error of the lag. */
  lagErrorS: number;
  /** Seconds of the companion's clock for one of this capture's; 1 where no drift shows. */
  clockRatio: number;
  /** Peak of the cross-correlation over the standard deviation that unrelated captures would give. */
  significance: number;
  /** Chance of such a peak anywhere among the lags between unrelated captures. */
  chanceProbability: number;
  /** 0 … 1: how far the common band's phases agree at this lag. */
  agreement: number;
  isInverted: boolean;
  overlapS: number;
}

/** One tone looked for in the companion at its own place and at the place of every frequency that looks like it here. */
export interface ToneMove {
  frequencyHz: number;
  /** How long it sounds, (Σp)²/Σp² of its power over time: 1/soundsS is how finely its place is known. */
  soundsS: number;
  /** Frames of one length over both captures, each with the other's at the same moment; else powers only. */
  isAligned: boolean;
  /** The unfolded frequency first, then by ascending true frequency. */
  places: TonePlace[];
}

export interface TonePlace {
  trueHz: number;
  /** Where it lands in the companion. */
  expectedHz: number;
  /** Amplitude there over the tone's here, dB; aligned: only what moves together with the tone over time. */
  ratioDb: number;
  /** The same at places beside it, where nothing is expected, dB. */
  besideDb: number;
  /**
   * What this capture shows at that place itself, the same way, over the tone, dB, where the two could not be told apart; null
   * where they were, beyond its fs/2 and at the tone itself.
   */
  hereDb: number | null;
  /** 0 … 1: squared correlation over time of the tone here and what stands there; null where not aligned. */
  coherence: number | null;
}
