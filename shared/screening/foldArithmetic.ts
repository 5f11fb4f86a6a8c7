/** Frequencies closer than this share of the sampling rate to a boundary count as on it. */
const boundaryTolerance = 1e-9;

/** Where a frequency lands after sampling: |f − fs·round(f/fs)|, between 0 and fs/2. */
export function aliasHz(frequencyHz: number, sampleRateHz: number): number {
  assertRate(sampleRateHz);
  return Math.abs(frequencyHz - sampleRateHz * Math.round(frequencyHz / sampleRateHz));
}

export interface Zone {
  /** Zone n covers (n−1)·fs/2 ≤ f < n·fs/2; a multiple of fs/2 belongs to the upper zone. */
  number: number;
  /** Odd zones keep direction, even zones mirror; on a boundary there is no direction. */
  direction: 'kept' | 'mirrored' | 'none';
}

export function zoneOf(frequencyHz: number, sampleRateHz: number): Zone {
  assertRate(sampleRateHz);
  const halves = (2 * Math.abs(frequencyHz)) / sampleRateHz;
  const nearest = Math.round(halves);
  if (Math.abs(halves - nearest) <= 2 * boundaryTolerance) return { number: nearest + 1, direction: 'none' };
  const number = Math.floor(halves) + 1;
  return { number, direction: number % 2 === 1 ? 'kept' : 'mirrored' };
}

/**
 * All frequencies up to a limit that look like `apparentHz`: itself, then k·fs − f and k·fs + f, ascending, so that the
 * smallest zone comes first; without duplicates at 0 and fs/2.
 */
export function candidatesHz(apparentHz: number, sampleRateHz: number, upToHz: number): number[] {
  const base = aliasHz(apparentHz, sampleRateHz);
  const tolerance = boundaryTolerance * sampleRateHz;
  const found = base <= upToHz ? [base] : [];
  for (let k = 1; k * sampleRateHz - base <= upToHz; k++) {
    for (const candidate of [k * sampleRateHz - base, k * sampleRateHz + base]) {
      const last = found[found.length - 1];
      if (candidate <= upToHz && (last === undefined || candidate - last > tolerance)) found.push(candidate);
    }
  }
  return found;
}

/** Sampling at exactly this rate still folds F onto fs/2: the rate has to be above 2F. */
export function lowestRateHz(highestFrequencyHz: number): number {
  return 2 * highestFrequencyHz;
}

/** With a filter that reaches the protection at `stopbandHz`, whatever folds lands above F once fs ≥ F + Fs. */
export function lowestProtectedRateHz(highestFrequencyHz: number, stopbandHz: number): number {
  return Math.max(lowestRateHz(highestFrequencyHz), highestFrequencyHz + stopbandHz);
}

export interface BandpassRange {
  /** n: the band lies in zone n. */
  n: number;
  aboveHz: number;
  /** null: no upper limit (n = 1). */
  belowHz: number | null;
  mirrored: boolean;
}

/**
 * Rates at which a band F1..F2 folds onto itself without overlap: 2·F2/n < fs < 2·F1/(n−1), end points excluded
 * (Vaughan, Scott & White 1991). Guard bands have to be included in F1 and F2.
 * @throws RangeError unless 0 ≤ F1 < F2
 */
export function bandpassRates(lowHz: number, highHz: number): BandpassRange[] {
  if (!(lowHz >= 0 && highHz > lowHz)) throw new RangeError(`A band needs 0 ≤ low < high, got ${lowHz} and ${highHz}.`);
  const most = Math.floor(highHz / (highHz - lowHz));
  return Array.from({ length: most }, (_, index) => {
    const n = index + 1;
    return { n, aboveHz: (2 * highHz) / n, belowHz: n === 1 ? null : (2 * lowHz) / (n - 1), mirrored: n % 2 === 0 };
  }).filter((range) => range.belowHz === null || range.belowHz > range.aboveHz);
}

function assertRate(sampleRateHz: number): void {
  if (!(sampleRateHz > 0)) throw new RangeError(`A sampling rate must be above 0, got ${sampleRateHz}.`);
}
