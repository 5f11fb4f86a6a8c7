/** One of the strongest lines beyond the folding frequency; `foldedHz` is null where it moves. */
export interface LabelledTone {
  trueHz: number;
  foldedHz: number | null;
  isVisible: boolean;
}

/**
 * A capture with its truth. Ratios in dB: folded energy against the whole capture.
 * `label`: folded (over −40 dB counting what lands below 0.9·fs/2), clean (under −70 dB in all), grey between, na.
 */
export interface LabelledCapture {
  /** Name of its set: one set is made in one go. */
  set: string;
  path: string;
  file: string;
  /** real, synthetic or degenerate. */
  part: string;
  family: string;
  operation: string;
  filter: string;
  label: 'folded' | 'grey' | 'clean' | 'na';
  /** The recording that it was made from; '' for a synthetic one. */
  source: string;
  sampleRateHz: number;
  isIrregular: boolean;
  /** Folded share of ten equal bands from 0 to fs/2; empty where not known. */
  bandFoldDb: number[];
  tones: LabelledTone[];
  /** Whether `tones` names all there are, so that any other one reported is wrong. */
  hasAllTones: boolean;
  isRateRaised: boolean;
  trueBandwidthHz: number | null;
  defects: string[];
  lookalike: string;
  pairId: string;
  /** What there is to see in a folded capture: tone, moving_mirror, no_rolloff, pair, irregular, weak, none. */
  evidence: string;
  /** What the rule for the clear-to frequency gives on the true densities; null where these are not known. */
  trueClearToHz: number | null;
}

/** The unit of resampling: the recording, or the event for the two files of a synthetic pair, or the capture itself. */
export function recordingOf({ source, pairId, set, file }: LabelledCapture): string {
  if (source !== '') return source;
  return pairId === '' ? `${set}/${file}` : `${set}/pair ${pairId}`;
}
