/** The p-quantile of the standard normal distribution (Acklam's rational approximation, relative error below 1.2e-9). */
export function normalQuantile(p: number): number {
  if (!(p > 0 && p < 1)) throw new RangeError(`A probability strictly between 0 and 1 is needed, got ${p}.`);
  const a = [
    -39.69683028665376, 220.9460984245205, -275.9285104469687, 138.357751867269, -30.66479806614716, 2.506628277459239,
  ];
  const b = [-54.47609879822406, 161.5858368580409, -155.6989798598866, 66.80131188771972, -13.28068155288572, 1];
  const c = [
    -0.007784894002430293, -0.3223964580411365, -2.400758277161838, -2.549732539343734, 4.374664141464968,
    2.938163982698783,
  ];
  const d = [0.007784695709041462, 0.3224671290700398, 2.445134137142996, 3.754408661907416, 1];
  const polynomial = (coefficients: number[], x: number): number =>
    coefficients.reduce((sum, value) => sum * x + value, 0);
  if (p < 0.02425 || p > 1 - 0.02425) {
    const q = Math.sqrt(-2 * Math.log(Math.min(p, 1 - p)));
    const value = polynomial(c, q) / polynomial(d, q);
    return p < 0.5 ? value : -value;
  }
  const q = p - 0.5;
  const r = q * q;
  return (polynomial(a, r) * q) / polynomial(b, r);
}
