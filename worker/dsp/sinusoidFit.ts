import { Matrix, solve } from 'ml-matrix';

export interface SinusoidFit {
  constant: number;
  /** Per frequency: amplitudes of cosine and sine at time 0. */
  cosines: number[];
  sines: number[];
}

/** Joint least-squares amplitudes of sinusoids of known frequencies plus a constant, at any sampling times. */
export function sinusoidFit(
  timesS: ArrayLike<number>,
  values: ArrayLike<number>,
  frequenciesHz: readonly number[],
): SinusoidFit {
  const columns = 1 + 2 * frequenciesHz.length;
  const normal = Matrix.zeros(columns, columns);
  const right = Matrix.zeros(columns, 1);
  const row = new Float64Array(columns);
  for (let n = 0; n < timesS.length; n++) {
    row[0] = 1;
    frequenciesHz.forEach((frequency, index) => {
      const angle = 2 * Math.PI * frequency * (timesS[n] as number);
      row[1 + 2 * index] = Math.cos(angle);
      row[2 + 2 * index] = Math.sin(angle);
    });
    for (let i = 0; i < columns; i++) {
      right.set(i, 0, right.get(i, 0) + (row[i] as number) * (values[n] as number));
      for (let j = 0; j <= i; j++) normal.set(i, j, normal.get(i, j) + (row[i] as number) * (row[j] as number));
    }
  }
  // A trace of damping keeps two frequencies that the times can't tell apart from blowing up.
  for (let i = 0; i < columns; i++) {
    normal.set(i, i, normal.get(i, i) + 1e-9 * timesS.length);
    for (let j = i + 1; j < columns; j++) normal.set(i, j, normal.get(j, i));
  }
  const solution = solve(normal, right).to1DArray();
  return {
    constant: solution[0] ?? 0,
    cosines: frequenciesHz.map((_, index) => solution[1 + 2 * index] ?? 0),
    sines: frequenciesHz.map((_, index) => solution[2 + 2 * index] ?? 0),
  };
}

export function sinusoidResidual(
  timesS: ArrayLike<number>,
  values: ArrayLike<number>,
  frequenciesHz: readonly number[],
  fit: SinusoidFit,
): Float64Array {
  return Float64Array.from({ length: timesS.length }, (_, n) => {
    let model = fit.constant;
    frequenciesHz.forEach((frequency, index) => {
      const angle = 2 * Math.PI * frequency * (timesS[n] as number);
      model += (fit.cosines[index] ?? 0) * Math.cos(angle) + (fit.sines[index] ?? 0) * Math.sin(angle);
    });
    return (values[n] as number) - model;
  });
}
