/**
 * Solves the symmetric positive definite system in place by Cholesky's method.
 * @param matrix row-major, size×size, lower triangle read; holds the factor afterwards
 * @param right holds the solution afterwards
 * @returns diagonal of the inverse, or null where the matrix is not positive definite
 */
export function solveNormal(matrix: Float64Array, right: Float64Array, size: number): Float64Array | null {
  const at = (i: number, j: number): number => matrix[i * size + j] as number;
  for (let j = 0; j < size; j++) {
    let pivot = at(j, j);
    const start = pivot;
    for (let k = 0; k < j; k++) pivot -= at(j, k) ** 2;
    if (!(pivot > 1e-13 * start)) return null;
    const root = Math.sqrt(pivot);
    matrix[j * size + j] = root;
    for (let i = j + 1; i < size; i++) {
      let sum = at(i, j);
      for (let k = 0; k < j; k++) sum -= at(i, k) * at(j, k);
      matrix[i * size + j] = sum / root;
    }
  }
  for (let i = 0; i < size; i++) {
    let sum = right[i] as number;
    for (let k = 0; k < i; k++) sum -= at(i, k) * (right[k] as number);
    right[i] = sum / at(i, i);
  }
  for (let i = size - 1; i >= 0; i--) {
    let sum = right[i] as number;
    for (let k = i + 1; k < size; k++) sum -= at(k, i) * (right[k] as number);
    right[i] = sum / at(i, i);
  }
  return inverseDiagonal(at, size);
}

/** Column by column of the factor's inverse: the squares add up to the diagonal. */
function inverseDiagonal(at: (i: number, j: number) => number, size: number): Float64Array {
  const diagonal = new Float64Array(size);
  const column = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    let sumOfSquares = 0;
    for (let i = j; i < size; i++) {
      let sum = i === j ? 1 : 0;
      for (let k = j; k < i; k++) sum -= at(i, k) * (column[k] as number);
      column[i] = sum / at(i, i);
      sumOfSquares += (column[i] as number) ** 2;
    }
    diagonal[j] = sumOfSquares;
  }
  return diagonal;
}
