/** A made signal, noise-free, split into what belongs below fs/2 and what was folded; arrays of equal length. */
export interface MadeCapture {
  family: string;
  /** What was done about the band: the filter's name, or "none". */
  filter: string;
  sampleRateHz: number;
  rightful: Float64Array;
  folded: Float64Array;
  /** Lines beyond fs/2; `foldedHz` null where they move. */
  tones: MadeTone[];
  /** Uneven stamps; the rate is then the mean rate. */
  timesS?: Float64Array;
  /** What there is to see, where the making settles it. */
  evidence?: string;
  lookalike?: string;
  pairId?: string;
  raisedFromHz?: number;
  /** Noise added after sampling against the signal, dB; left out: drawn. null: none. */
  signalToNoiseDb?: number | null;
  /** What stands next to fs/2 and what the density is, lines of constant frequency apart: needed for the true clear-to. */
  edge?: 'ofSignal' | 'linesOnly';
  /** One-sided density of the signal where it is known exactly, in proportion; otherwise it is averaged from the samples. */
  density?: (frequencyHz: number) => number;
}

export interface MadeTone {
  trueHz: number;
  foldedHz: number | null;
  levelDb: number;
}

/** One family: makes a capture (or the two of a pair); `isBad` asks for one that folds. */
export type MakeFamily = (random: () => number, isBad: boolean, index: number) => MadeCapture[];
