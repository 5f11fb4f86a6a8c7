/** SVG path of a small spectrum: densities in dB from left to right, the strongest at the top. */
export function stripPath(densityDb: number[], width: number, height: number): string {
  if (densityDb.length < 2) return '';
  const highest = Math.max(...densityDb);
  // 100 dB below the strongest is floor enough for a picture this small.
  const lowest = Math.max(Math.min(...densityDb), highest - 100);
  const range = highest - lowest || 1;
  return densityDb
    .map((level, index) => {
      const x = (index / (densityDb.length - 1)) * width;
      const y = height - 1 - ((Math.max(level, lowest) - lowest) / range) * (height - 2);
      return `${index === 0 ? 'M' : 'L'}${x.toFixed(1)} ${y.toFixed(1)}`;
    })
    .join('');
}
