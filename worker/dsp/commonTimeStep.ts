/**
 * The largest step of which all intervals are whole multiples, within the rounding of the stamps, or null: the sampling
 * pattern then can't tell frequencies beyond 1/(2·step) from their images (Eyer & Bartholdi 1999).
 */
export function commonTimeStep(timesS: Float64Array, roundingStepS: number): number | null {
  let least = Number.POSITIVE_INFINITY;
  for (let n = 1; n < timesS.length; n++) {
    const interval = (timesS[n] as number) - (timesS[n - 1] as number);
    if (interval > roundingStepS) least = Math.min(least, interval);
  }
  if (!Number.isFinite(least)) return null;
  for (let parts = 1; parts <= 8; parts++) {
    const step = refineStep(timesS, least / parts);
    const tolerance = Math.max(roundingStepS, 1e-9 * step);
    if (tolerance < 0.1 * step && followsStep(timesS, step, tolerance)) return step;
  }
  return null;
}

/** Lengthens the base over which the step is measured, so that its error stays below the rounding. */
function refineStep(timesS: Float64Array, start: number): number {
  let step = start;
  const first = timesS[0] as number;
  for (let reach = 4; reach < 2 * timesS.length; reach *= 2) {
    const span = (timesS[Math.min(reach, timesS.length - 1)] as number) - first;
    const count = Math.round(span / step);
    if (count > 0) step = span / count;
  }
  return step;
}

function followsStep(timesS: Float64Array, step: number, tolerance: number): boolean {
  for (let n = 1; n < timesS.length; n++) {
    const interval = (timesS[n] as number) - (timesS[n - 1] as number);
    if (Math.abs(interval - step * Math.round(interval / step)) > 1.5 * tolerance) return false;
  }
  return true;
}
