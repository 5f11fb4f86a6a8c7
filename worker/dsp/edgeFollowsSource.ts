import type { EdgeFollowsMeasurement } from '../../shared/screening/MeasurementRecord.js';
import { quantile } from './quantile.js';

/**
 * Fits edge(t) = floor + slope·inband(t) over frames, weighting each frame by 1/fit² (densities are
 * exponentially distributed: their spread goes with their level) in three rounds of reweighted least squares, floor and
 * slope not negative. A slope above 0 means that the edge follows the signal; slope 0 a converter floor.
 * @param edge mean edge density per frame; @param inband mean in-band density per frame; linear
 * @returns null with fewer than 8 frames or without any in-band power
 */
export function edgeFollowsSource(edge: ArrayLike<number>, inband: ArrayLike<number>): EdgeFollowsMeasurement | null {
  const frames = edge.length;
  if (frames < 8) return null;
  const low = quantile(inband, 0.05);
  const high = quantile(inband, 0.95);
  let sumEdge = 0;
  let sumInband = 0;
  for (let n = 0; n < frames; n++) {
    sumEdge += edge[n] as number;
    sumInband += inband[n] as number;
  }
  if (!(high > 0) || !(sumEdge > 0)) return null;
  let floor = quantile(edge, 0.2);
  let slope = 0;
  let slopeError = 0;
  for (let round = 0; round < 4; round++) {
    let [w, wx, wy, wxx, wxy] = [0, 0, 0, 0, 0];
    const least = (1e-6 * sumEdge) / frames;
    const weights = Float64Array.from(
      { length: frames },
      (_, n) => 1 / Math.max(least, floor + slope * (inband[n] as number)) ** 2,
    );
    for (let n = 0; n < frames; n++) {
      const [weight, x, y] = [weights[n] as number, inband[n] as number, edge[n] as number];
      w += weight;
      wx += weight * x;
      wy += weight * y;
      wxx += weight * x * x;
      wxy += weight * x * y;
    }
    const determinant = w * wxx - wx * wx;
    if (!(determinant > 1e-12 * w * wxx)) return null;
    slope = (w * wxy - wx * wy) / determinant;
    floor = (wxx * wy - wx * wxy) / determinant;
    if (floor < 0) [floor, slope] = [0, wxy / wxx];
    if (slope < 0) [floor, slope] = [wy / w, 0];
    let chi = 0;
    for (let n = 0; n < frames; n++)
      chi += (weights[n] as number) * ((edge[n] as number) - floor - slope * (inband[n] as number)) ** 2;
    slopeError = Math.sqrt((Math.max(chi / (frames - 2), 1e-12) * w) / determinant);
  }
  const following = (slope * sumInband) / frames;
  return {
    frames,
    slope,
    slopeError,
    floorDb: floor > 0 ? 10 * Math.log10(floor) : null,
    inbandRangeDb: Math.min(200, 10 * Math.log10(high / Math.max(low, high * 1e-20))),
    correlation: logCorrelation(edge, inband),
    followingShareDb: slope > 0 ? 10 * Math.log10(following / (sumEdge / frames)) : null,
  };
}

function logCorrelation(a: ArrayLike<number>, b: ArrayLike<number>): number {
  let [sa, sb, saa, sbb, sab, count] = [0, 0, 0, 0, 0, 0];
  for (let n = 0; n < a.length; n++) {
    if (!((a[n] as number) > 0 && (b[n] as number) > 0)) continue;
    const [x, y] = [Math.log(a[n] as number), Math.log(b[n] as number)];
    sa += x;
    sb += y;
    saa += x * x;
    sbb += y * y;
    sab += x * y;
    count++;
  }
  const spread = Math.sqrt(Math.max(0, saa - (sa * sa) / count) * Math.max(0, sbb - (sb * sb) / count));
  return spread > 0 ? (sab - (sa * sb) / count) / spread : 0;
}
