/** Legendre polynomials P₀ … P_degree at x, −1 … 1, by the three-term recurrence. */
export function legendre(x: number, degree: number): Float64Array {
  const values = new Float64Array(degree + 1);
  values[0] = 1;
  if (degree > 0) values[1] = x;
  for (let n = 1; n < degree; n++) {
    values[n + 1] = ((2 * n + 1) * x * (values[n] as number) - n * (values[n - 1] as number)) / (n + 1);
  }
  return values;
}

/**
 * Weighted least squares of Legendre polynomials P₁ … P_degree (without the constant) on values at points x; coefficients
 * are held back a little where the weights leave them open.
 */
export function fitLegendre(
  x: Float64Array,
  values: Float64Array,
  weights: Float64Array,
  degree: number,
): Float64Array {
  const size = degree;
  const matrix = Array.from({ length: size }, () => new Float64Array(size + 1));
  let total = 0;
  x.forEach((place, j) => {
    const basis = legendre(place, degree).subarray(1);
    const weight = weights[j] as number;
    total += weight;
    for (let a = 0; a < size; a++) {
      const row = matrix[a] as Float64Array;
      const scaled = weight * (basis[a] as number);
      for (let b = 0; b < size; b++) row[b] = (row[b] as number) + scaled * (basis[b] as number);
      row[size] = (row[size] as number) + scaled * (values[j] as number);
    }
  });
  matrix.forEach((row, a) => (row[a] = (row[a] as number) + (1e-3 * total) / (2 * a + 3)));
  return solve(matrix);
}

/** Gaussian elimination with pivots on rows that hold their right-hand side last. */
function solve(rows: Float64Array[]): Float64Array {
  const size = rows.length;
  for (let column = 0; column < size; column++) {
    let pivot = column;
    for (let row = column + 1; row < size; row++) {
      if (Math.abs(rows[row]?.[column] as number) > Math.abs(rows[pivot]?.[column] as number)) pivot = row;
    }
    [rows[column], rows[pivot]] = [rows[pivot] as Float64Array, rows[column] as Float64Array];
    const top = rows[column] as Float64Array;
    const head = top[column] as number;
    if (head === 0) continue;
    for (let row = column + 1; row < size; row++) {
      const below = rows[row] as Float64Array;
      const factor = (below[column] as number) / head;
      for (let k = column; k <= size; k++) below[k] = (below[k] as number) - factor * (top[k] as number);
    }
  }
  const result = new Float64Array(size);
  for (let row = size - 1; row >= 0; row--) {
    const values = rows[row] as Float64Array;
    let sum = values[size] as number;
    for (let k = row + 1; k < size; k++) sum -= (values[k] as number) * (result[k] as number);
    const head = values[row] as number;
    result[row] = head === 0 ? 0 : sum / head;
  }
  return result;
}
