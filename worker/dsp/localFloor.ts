const stretchesAtMost = 64;
const leastCells = 192;
const looked = 256;

/**
 * Mean level around each place of a periodogram, from medians of stretches (a median of exponentially distributed powers is
 * ln 2 of their mean; Scargle 1982), joined by straight lines: peaks don't raise it, a coloured background does.
 */
export function localFloor(power: Float64Array): Float64Array {
  const stretches = Math.max(1, Math.min(stretchesAtMost, Math.floor(power.length / leastCells)));
  const width = power.length / stretches;
  const levels = Float64Array.from({ length: stretches }, (_, index) =>
    medianOfSome(power, Math.floor(index * width), Math.floor((index + 1) * width)),
  );
  const floor = new Float64Array(power.length);
  for (let k = 0; k < floor.length; k++) {
    const place = Math.min(Math.max((k + 0.5) / width - 0.5, 0), stretches - 1);
    const below = Math.floor(place);
    const low = levels[below] as number;
    floor[k] = low + ((levels[Math.min(below + 1, stretches - 1)] as number) - low) * (place - below);
  }
  return floor;
}

/** Neighbours hardly differ: evenly spread places are enough for a median. */
function medianOfSome(power: Float64Array, from: number, to: number): number {
  const stride = Math.max(1, Math.floor((to - from) / looked));
  const some = new Float64Array(Math.ceil((to - from) / stride));
  for (let k = 0; k < some.length; k++) some[k] = power[from + k * stride] as number;
  some.sort();
  return Math.max(1e-300, (some[Math.floor(some.length / 2)] ?? 0) / Math.LN2);
}

/** The place that stands highest above its surroundings, and by how many times. */
export function highestAboveFloor(power: Float64Array): { index: number; ratio: number } {
  const floor = localFloor(power);
  let index = 0;
  let ratio = 0;
  for (let k = 0; k < power.length; k++) {
    const here = (power[k] as number) / (floor[k] as number);
    if (here > ratio) [index, ratio] = [k, here];
  }
  return { index, ratio };
}

/**
 * The strongest place of those that stand at least `leastRatio` above their surroundings, and the places nearly as strong;
 * null for none. Strength decides: a strong tone's images in the window's pattern may stand higher above what surrounds
 * them than the tone itself.
 */
export function strongestAboveFloor(
  power: Float64Array,
  leastRatio: number,
): { ratio: number; places: number[] } | null {
  const floor = localFloor(power);
  let [top, ratio] = [-1, 0];
  for (let k = 0; k < power.length; k++) {
    if (top >= 0 && !((power[k] as number) > (power[top] as number))) continue;
    const here = (power[k] as number) / (floor[k] as number);
    if (here >= leastRatio) [top, ratio] = [k, here];
  }
  if (top < 0) return null;
  const standing = power.map((value, k) => (value / (floor[k] as number) >= leastRatio ? value : 0));
  return { ratio, places: nearlyHighest(standing) };
}

/** A peak half-way between the coarsest grid points shows at least this share of its height. */
export const seenShare = 0.75;
const mostPlaces = 6;

/** Local maxima within what the grid may hide of the highest, the highest first. */
export function nearlyHighest(power: Float64Array): number[] {
  const least = seenShare * power.reduce((highest, value) => Math.max(highest, value), 0);
  const places: number[] = [];
  if (!(least > 0)) return places;
  for (let k = 0; k < power.length; k++) {
    const here = power[k] as number;
    if (here >= least && here >= (power[k - 1] ?? 0) && here > (power[k + 1] ?? 0)) places.push(k);
  }
  return places.sort((a, b) => (power[b] as number) - (power[a] as number)).slice(0, mostPlaces);
}
