import { solveNormal } from './solveNormal.js';

export interface SinusoidFit {
  constant: number;
  frequenciesHz: number[];
  /** Per frequency: amplitudes of cosine and sine at time 0. */
  cosines: number[];
  sines: number[];
  /** Values less the model. */
  residual: Float64Array;
  /** Per frequency: its standard deviation for a noise of standard deviation 1 (Cramér-Rao, from the Jacobian); 0 where kept. */
  spreadHz: number[];
}

/**
 * Joint least squares of sinusoids plus a constant at any sampling times. With `steps` 0 the frequencies are kept; else
 * all frequencies and amplitudes together are moved by that many Gauss-Newton steps, none by more than `mostShiftHz`.
 * Times are best counted from the middle of the capture. Frequencies that the times can't tell apart are damped, so that
 * the amplitudes stay finite.
 */
export function sinusoidFit(
  timesS: Float64Array,
  values: Float64Array,
  frequenciesHz: readonly number[],
  { steps = 0, mostShiftHz = 0 }: { steps?: number; mostShiftHz?: number } = {},
): SinusoidFit {
  let { fit, columns } = solveAmplitudes(timesS, values, frequenciesHz);
  for (let step = 0; step < steps; step++) {
    const moved = gaussNewtonStep(timesS, fit, columns, mostShiftHz);
    if (moved === null) break;
    const next = solveAmplitudes(timesS, values, moved.frequenciesHz);
    if (step > 0 && !(energy(next.fit.residual) < energy(fit.residual))) break;
    fit = { ...next.fit, spreadHz: moved.spreadHz };
    columns = next.columns;
  }
  return fit;
}

/** What the model of some of the tones takes at the times; without indices: all tones and the constant. */
export function sinusoidModel(timesS: Float64Array, fit: Omit<SinusoidFit, 'residual'>, only?: number): Float64Array {
  const model = new Float64Array(timesS.length).fill(only === undefined ? fit.constant : 0);
  fit.frequenciesHz.forEach((frequency, index) => {
    if (only !== undefined && only !== index) return;
    const [cosine, sine] = [fit.cosines[index] as number, fit.sines[index] as number];
    for (let n = 0; n < model.length; n++) {
      const angle = 2 * Math.PI * frequency * (timesS[n] as number);
      model[n] = (model[n] as number) + cosine * Math.cos(angle) + sine * Math.sin(angle);
    }
  });
  return model;
}

/** The fit at given frequencies, and the columns behind it: 1, then cosine and sine per frequency. */
function solveAmplitudes(
  timesS: Float64Array,
  values: Float64Array,
  frequenciesHz: readonly number[],
): { fit: SinusoidFit; columns: Float64Array[] } {
  const columns = [new Float64Array(timesS.length).fill(1), ...frequenciesHz.flatMap((hz) => waves(timesS, hz))];
  // A trace of damping keeps two frequencies that the times can't tell apart from blowing up.
  const solution = leastSquares(columns, values, 1e-10)?.solution ?? new Float64Array(columns.length);
  const residual = values.slice();
  columns.forEach((column, c) => {
    const weight = solution[c] as number;
    for (let n = 0; n < residual.length; n++) residual[n] = (residual[n] as number) - weight * (column[n] as number);
  });
  const fit = {
    constant: solution[0] as number,
    frequenciesHz: [...frequenciesHz],
    cosines: frequenciesHz.map((_, index) => solution[1 + 2 * index] as number),
    sines: frequenciesHz.map((_, index) => solution[2 + 2 * index] as number),
    residual,
    spreadHz: frequenciesHz.map(() => 0),
  };
  return { fit, columns };
}

function waves(timesS: Float64Array, frequencyHz: number): [Float64Array, Float64Array] {
  const [cosine, sine] = [new Float64Array(timesS.length), new Float64Array(timesS.length)];
  for (let n = 0; n < timesS.length; n++) {
    const angle = 2 * Math.PI * frequencyHz * (timesS[n] as number);
    cosine[n] = Math.cos(angle);
    sine[n] = Math.sin(angle);
  }
  return [cosine, sine];
}

function gaussNewtonStep(
  timesS: Float64Array,
  fit: SinusoidFit,
  waveColumns: Float64Array[],
  mostShiftHz: number,
): { frequenciesHz: number[]; spreadHz: number[] } | null {
  if (fit.frequenciesHz.length === 0) return null;
  const columns = waveColumns.slice(0, 1);
  fit.frequenciesHz.forEach((_, index) => {
    const cosine = waveColumns[1 + 2 * index] as Float64Array;
    const sine = waveColumns[2 + 2 * index] as Float64Array;
    const [a, b] = [fit.cosines[index] as number, fit.sines[index] as number];
    const slope = new Float64Array(timesS.length);
    for (let n = 0; n < slope.length; n++) {
      slope[n] = 2 * Math.PI * (timesS[n] as number) * (b * (cosine[n] as number) - a * (sine[n] as number));
    }
    columns.push(cosine, sine, slope);
  });
  const solved = leastSquares(columns, fit.residual, 0);
  if (solved === null) return null;
  const place = (index: number): number => 3 + 3 * index;
  return {
    frequenciesHz: fit.frequenciesHz.map((hz, index) => {
      const shift = solved.solution[place(index)] as number;
      return hz + Math.max(-mostShiftHz, Math.min(mostShiftHz, shift));
    }),
    spreadHz: fit.frequenciesHz.map((_, index) => Math.sqrt(solved.inverseDiagonal[place(index)] as number)),
  };
}

/** Normal equations of columns scaled to unit length. */
function leastSquares(
  columns: Float64Array[],
  values: Float64Array,
  damping: number,
): { solution: Float64Array; inverseDiagonal: Float64Array } | null {
  const size = columns.length;
  const scales = columns.map((column) => 1 / Math.sqrt(Math.max(1e-300, energy(column))));
  const normal = new Float64Array(size * size);
  const right = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    const scale = scales[i] as number;
    right[i] = scale * dot(columns[i] as Float64Array, values);
    for (let j = 0; j < i; j++) {
      normal[i * size + j] =
        scale * (scales[j] as number) * dot(columns[i] as Float64Array, columns[j] as Float64Array);
    }
    normal[i * size + i] = 1 + damping;
  }
  const inverse = solveNormal(normal, right, size);
  if (inverse === null) return null;
  return {
    solution: right.map((value, i) => value * (scales[i] as number)),
    inverseDiagonal: inverse.map((value, i) => value * (scales[i] as number) ** 2),
  };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let n = 0; n < a.length; n++) sum += (a[n] as number) * (b[n] as number);
  return sum;
}

const energy = (values: Float64Array): number => dot(values, values);
