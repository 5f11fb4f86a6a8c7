import { createRealFft } from '../createRealFft.js';

/** What one peak of one short frame says about the speed there. */
export interface ChirpVote {
  /** Middle of the frame, in samples. */
  at: number;
  /** Frequency there, cycles a sample. */
  frequency: number;
  /** Change of frequency, cycles a sample². */
  slope: number;
  /** Standard error of the slope. */
  slopeError: number;
  frameLength: number;
  /** Frame length and octave: votes of one cell are as good as each other. */
  cell: number;
  /** Spread of the slope of a peak of plain noise. */
  noiseSpread: number;
}

/** Spectra with the windows g, t·g, g′, t·g′, g″. */
type Spectra = [Float64Array, Float64Array, Float64Array, Float64Array, Float64Array];

const leastRatio = 8;
/** Peaks kept of all frames of one length, the strongest of each frame. */
const votesPerLength = 900;

/**
 * Frequency and slope of every peak in short frames, from five transforms a frame (Hann window g, and t·g, g′, t·g′, g″):
 * exact for a linear chirp (second-order reassignment; Oberlin, Meignen & Perrier 2015, eq. 12).
 */
export function chirpVotes(samples: Float64Array, length: number): ChirpVote[] {
  const fft = createRealFft(length);
  const shapes = windows(length);
  const spectra = shapes.map(() => new Float64Array(length + 2)) as Spectra;
  const input = new Float64Array(length);
  const half = length / 2;
  const power = new Float64Array(half + 1);
  const votes: ChirpVote[] = [];
  const hop = half;
  const mostPerFrame = Math.max(4, Math.ceil((votesPerLength * hop) / samples.length));
  for (let first = 0; first + length <= samples.length; first += hop) {
    shapes.forEach((shape, i) => {
      for (let n = 0; n < length; n++) input[n] = (samples[first + n] as number) * (shape[n] as number);
      spectra[i]?.set(fft.transform(input).subarray(0, length + 2));
    });
    const [g] = spectra;
    for (let k = 0; k <= half; k++) power[k] = (g[2 * k] as number) ** 2 + (g[2 * k + 1] as number) ** 2;
    const floor = Float64Array.from(power).sort()[Math.floor(half / 2)] as number;
    const peaks: ChirpVote[] = [];
    for (let k = 3; k < half - 3; k++) {
      const height = power[k] as number;
      if (height < leastRatio * floor || height < (power[k - 1] as number) || height <= (power[k + 1] as number))
        continue;
      const read = readPeak(spectra, k, length);
      if (read === null) continue;
      const ratio = height / Math.max(floor, 1e-300);
      const unit = 1 / (length * length);
      const cell = 8 * Math.log2(length) + Math.min(7, Math.floor(-Math.log2(read.frequency)));
      peaks.push({
        at: first + half,
        ...read,
        cell,
        frameLength: length,
        slopeError: Math.sqrt(30 / ratio + 0.01) * unit,
        noiseSpread: unit,
      });
    }
    peaks.sort((a, b) => a.slopeError - b.slopeError);
    votes.push(...peaks.slice(0, mostPerFrame));
  }
  return votes;
}

function readPeak(
  [g, tg, dg, tdg, ddg]: Spectra,
  k: number,
  length: number,
): { frequency: number; slope: number } | null {
  const at = (x: Float64Array): [number, number] => [x[2 * k] as number, x[2 * k + 1] as number];
  const [a, b, c, d, e] = [at(g), at(tg), at(dg), at(tdg), at(ddg)];
  const top = minus(times(e, a), times(c, c));
  const bottom = minus(times(b, c), times(d, a));
  const norm = bottom[0] ** 2 + bottom[1] ** 2;
  const power = a[0] ** 2 + a[1] ** 2;
  if (!(norm > 1e-12 * power * power)) return null;
  // q = top/(2πi·bottom): its real part is the slope.
  const slope = (top[1] * bottom[0] - top[0] * bottom[1]) / (2 * Math.PI * norm);
  const frequency = k / length - (c[1] * a[0] - c[0] * a[1]) / (2 * Math.PI * power);
  const delay = (b[0] * a[0] + b[1] * a[1]) / power;
  const centre = frequency - slope * delay;
  if (!(Math.abs(slope) * length < 0.25) || !(centre > 0 && centre < 0.5)) return null;
  return { frequency: centre, slope };
}

const times = (a: [number, number], b: [number, number]): [number, number] => [
  a[0] * b[0] - a[1] * b[1],
  a[0] * b[1] + a[1] * b[0],
];
const minus = (a: [number, number], b: [number, number]): [number, number] => [a[0] - b[0], a[1] - b[1]];

function windows(length: number): Float64Array[] {
  const w = (2 * Math.PI) / length;
  const make = (at: (t: number) => number): Float64Array => Float64Array.from({ length }, (_, n) => at(n - length / 2));
  const g = (t: number): number => 0.5 + 0.5 * Math.cos(w * t);
  const dg = (t: number): number => -0.5 * w * Math.sin(w * t);
  return [
    make(g),
    make((t) => t * g(t)),
    make(dg),
    make((t) => t * dg(t)),
    make((t) => -0.5 * w * w * Math.cos(w * t)),
  ];
}
