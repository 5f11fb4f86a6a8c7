/**
 * Running median of `values` over a window of 2·reach+1, narrowed at the ends so that it stays centred where it can and
 * whole where it can't. Kept sorted by insertion: cost grows with length·reach, fine for spectra.
 */
export function runningMedian(values: ArrayLike<number>, reach: number): Float64Array {
  const length = values.length;
  const result = new Float64Array(length);
  const width = Math.min(2 * reach + 1, length);
  const sorted = Float64Array.from({ length: width }, (_, index) => values[index] as number).sort();
  let first = 0;
  for (let place = 0; place < length; place++) {
    const wanted = Math.min(Math.max(place - reach, 0), length - width);
    while (first < wanted) {
      replaceSorted(sorted, values[first] as number, values[first + width] as number);
      first++;
    }
    const middle = width >> 1;
    result[place] =
      width % 2 === 1 ? (sorted[middle] as number) : ((sorted[middle - 1] as number) + (sorted[middle] as number)) / 2;
  }
  return result;
}

function replaceSorted(sorted: Float64Array, leaving: number, entering: number): void {
  let place = lowerBound(sorted, leaving);
  while (place > 0 && (sorted[place - 1] as number) > entering) {
    sorted[place] = sorted[place - 1] as number;
    place--;
  }
  while (place < sorted.length - 1 && (sorted[place + 1] as number) < entering) {
    sorted[place] = sorted[place + 1] as number;
    place++;
  }
  sorted[place] = entering;
}

function lowerBound(sorted: Float64Array, value: number): number {
  let low = 0;
  let high = sorted.length;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((sorted[middle] as number) < value) low = middle + 1;
    else high = middle;
  }
  return Math.min(low, sorted.length - 1);
}
