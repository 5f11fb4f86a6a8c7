/**
 * The largest step of which all intervals are whole multiples, within the rounding of the stamps, or null: the sampling
 * pattern then can't tell frequencies beyond 1/(2·step) from their images (Eyer & Bartholdi 1999). The stamps are set
 * against the grid as a whole, not interval by interval, so that single roundings don't hide it.
 */
export function commonTimeStep(timesS: Float64Array, roundingStepS: number): number | null {
  return gridStep(timesS, roundingStepS) ?? commonDivisor(timesS, roundingStepS);
}

/** Stamps written in whole steps have intervals of whole steps, however they came about. */
function commonDivisor(timesS: Float64Array, roundingStepS: number): number | null {
  if (!(roundingStepS > 0)) return null;
  let divisor = 0;
  for (let n = 1; n < timesS.length && divisor !== 1; n++) {
    let rest = Math.round(((timesS[n] as number) - (timesS[n - 1] as number)) / roundingStepS);
    while (rest > 0) [divisor, rest] = [rest, divisor % rest];
  }
  return divisor === 0 ? null : divisor * roundingStepS;
}

function gridStep(timesS: Float64Array, roundingStepS: number): number | null {
  const intervals = timesS.subarray(1).map((time, n) => time - (timesS[n] as number));
  const least = intervals.reduce(
    (smallest, interval) => (interval > roundingStepS ? Math.min(smallest, interval) : smallest),
    Number.POSITIVE_INFINITY,
  );
  if (!Number.isFinite(least)) return null;
  // The least interval is rounded itself: those next to it, averaged, are a better start.
  let [sum, count] = [0, 0];
  for (const interval of intervals) {
    if (Math.abs(interval - least) > Math.max(2.01 * roundingStepS, 1e-6 * least)) continue;
    sum += interval;
    count++;
  }
  for (let parts = 1; parts <= mostParts; parts++) {
    const start = sum / count / parts;
    if (roundingStepS > coarsest * start) return null;
    const step = fittedStep(timesS, start, roundingStepS);
    if (step !== null) return step;
  }
  return null;
}

/** The least interval is taken to be up to this many steps. */
const mostParts = 12;
/** Rounding coarser than this share of the step hides it. */
const coarsest = 0.4;

/**
 * Counts whole steps from stamp to stamp and fits a line through stamps over counts, over stretches that double, so that
 * the step's error never adds up to half a step.
 * @returns null where the stamps lie off the grid by more than rounding explains
 */
function fittedStep(timesS: Float64Array, start: number, roundingStepS: number): number | null {
  let step = start;
  const allowed = 1.3 * (roundingStepS / Math.sqrt(12)) + 1e-7 * start;
  for (let reach = 8; ; reach *= 2) {
    const count = Math.min(reach, timesS.length);
    let [k, meanK, meanT, kk, kt, tt] = [0, 0, 0, 0, 0, 0];
    for (let n = 0; n < count; n++) {
      if (n > 0) k += Math.round(((timesS[n] as number) - (timesS[n - 1] as number)) / step);
      // Running sums about the mean (Welford 1962) of what the step so far leaves: small numbers keep their digits.
      const off = (timesS[n] as number) - (timesS[0] as number) - step * k;
      const [dk, dt] = [k - meanK, off - meanT];
      meanK += dk / (n + 1);
      meanT += dt / (n + 1);
      kk += dk * (k - meanK);
      kt += dk * (off - meanT);
      tt += dt * (off - meanT);
    }
    if (!(kk > 0)) return null;
    const rms = Math.sqrt(Math.max(0, tt - (kt * kt) / kk) / count);
    // Few stamps scatter more about their own deviation.
    if (rms > allowed * (1 + 1 / Math.sqrt(count))) return null;
    step += kt / kk;
    if (count === timesS.length) return step;
  }
}
