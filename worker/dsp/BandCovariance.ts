export interface FrequencyBand {
  fromHz: number;
  toHz: number;
}

/** One stretch of samples with, for each band, the covariance between all pairs of its times that a flat density gives. */
export interface BandCovariance {
  values: Float64Array;
  /** Per band over pairs (0,0), (1,0), (1,1), (2,0) …: 1 at equal times. */
  pairs: Float64Array[];
}

/**
 * Covariance of a stationary signal of power 1 spread evenly over a band, at lag τ:
 * [sin(2π·to·τ) − sin(2π·from·τ)]/(2π·(to − from)·τ) (Wiener & Khinchin).
 */
export function bandCovariance(timesS: Float64Array, values: Float64Array, bands: FrequencyBand[]): BandCovariance {
  const count = timesS.length;
  const pairs = bands.map(() => new Float64Array((count * (count + 1)) / 2));
  let pair = 0;
  for (let i = 0; i < count; i++) {
    for (let j = 0; j <= i; j++, pair++) {
      const angle = 2 * Math.PI * ((timesS[i] as number) - (timesS[j] as number));
      let [edgeHz, edgeSine] = [Number.NaN, 0];
      for (let b = 0; b < bands.length; b++) {
        const { fromHz, toHz } = bands[b] as FrequencyBand;
        const below = fromHz === edgeHz ? edgeSine : Math.sin(fromHz * angle);
        const above = Math.sin(toHz * angle);
        (pairs[b] as Float64Array)[pair] = angle === 0 ? 1 : (above - below) / ((toHz - fromHz) * angle);
        [edgeHz, edgeSine] = [toHz, above];
      }
    }
  }
  return { values, pairs };
}
