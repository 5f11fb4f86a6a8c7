/** ln Γ(x) for x > 0: Stirling's series (DLMF 5.11.1) after shifting x to 10 and above, where its error is below 1e-14. */
export function logGamma(x: number): number {
  let shift = 0;
  let z = x;
  while (z < 10) {
    shift += Math.log(z);
    z++;
  }
  const s = 1 / (z * z);
  const series = (1 / 12 - s * (1 / 360 - s * (1 / 1260 - s * (1 / 1680 - (s * 1) / 1188)))) / z;
  return (z - 0.5) * Math.log(z) - z + 0.5 * Math.log(2 * Math.PI) + series - shift;
}
