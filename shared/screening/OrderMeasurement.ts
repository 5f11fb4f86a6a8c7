/** How the speed law of a shaft was got. */
export type SpeedMode = 'speedChannel' | 'nominalSpeed' | 'blind';

/** Orders in one stretch of a channel: what turns with one shaft, in band and beyond fs/2. */
export interface OrderMeasurement {
  fromS: number;
  toS: number;
  /** Orders were looked for up to here. */
  highestHz: number;
  /** Speed laws that gather the energy in lines; empty at steady speed and where nothing turns. */
  laws: OrderLawMeasurement[];
}

export interface OrderLawMeasurement {
  mode: SpeedMode;
  /** Mean rate of the pulses of a speed channel, which may be several a turn. */
  pulseHz: number | null;
  /** Relative speed (mean 1) at both ends, and its whole range. */
  speedFrom: number;
  speedTo: number;
  speedChange: number;
  /** Mean square over squared mean of the bin powers in warped time, and at steady speed; 2 for noise. */
  sharpness: number;
  steadySharpness: number;
  /** Lines below fs/2 that follow the law, at relative speed 1; strongest first. */
  inBandLines: { frequencyHz: number; standsOutDb: number }[];
  /** Lines of other machines in the stretch, taken out as far as they are known. */
  otherLines: number;
  /** Places looked at beyond fs/2. */
  linesTried: number;
  /** Highest line beyond fs/2 under the opposite law (deviations turned round), which nothing follows. */
  chanceStandsOutDb: number;
  /** Lines seen where they lie beyond fs/2; strongest first. */
  lines: FoldedOrderMeasurement[];
}

export interface FoldedOrderMeasurement {
  /** Place in the capture, in the middle of the folded part. */
  frequencyHz: number;
  /** True frequency there, and at relative speed 1. */
  trueFrequencyHz: number;
  meanFrequencyHz: number;
  uncertaintyHz: number;
  /** Mean power over the whole stretch of the folded part. */
  levelDb: number;
  standsOutDb: number;
  /** The same line while below fs/2; null where it never is, or does not stand out. */
  inBandStandsOutDb: number | null;
  /** Share of the stretch during which it is folded. */
  foldedShare: number;
  /** Bins by which the folded path differs from a path in band: below about 3 nothing can be told. */
  apartBins: number;
  fromS: number;
  toS: number;
}
