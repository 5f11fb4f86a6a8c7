import FFT from 'fft.js';

/** Points of an envelope over the stretch; the bins within half as many on each side of the line go into it. */
export const envelopePoints = 64;
const half = envelopePoints / 2;
const fft = new FFT(envelopePoints);

/**
 * How a line's amplitude and phase go over warped time: the bins around it, with a raised-cosine weight, transformed back.
 * Point j belongs to warped shares around (j + ½)/points: its real part sums the samples there, turned back by the line.
 * @param reach bins on each side, at most half the points
 * @returns interleaved; the sum over all points is the line's bin
 */
export function lineEnvelope(spectrum: Float64Array, bin: number, reach = half): Float64Array {
  const input = new Float64Array(2 * envelopePoints);
  for (let m = -reach + 1; m < reach; m++) {
    const k = bin + m;
    const mirrored = k < 0;
    const place = 2 * Math.abs(k);
    if (place + 1 >= spectrum.length) continue;
    const weight = Math.cos((Math.PI * m) / (2 * reach)) ** 2;
    const turn = (Math.PI * m) / envelopePoints;
    const re = (spectrum[place] as number) * weight;
    const im = (spectrum[place + 1] as number) * (mirrored ? -1 : 1) * weight;
    const index = 2 * ((m + envelopePoints) % envelopePoints);
    input[index] = re * Math.cos(turn) - im * Math.sin(turn);
    input[index + 1] = re * Math.sin(turn) + im * Math.cos(turn);
  }
  const output = new Float64Array(2 * envelopePoints);
  fft.inverseTransform(output, input);
  return output;
}

/** Power of Σ z_j·mask_j·exp(−2πi·m·(j + ½)/points), the line seen only where the mask is 1, m bins beside its place. */
export function maskedPower(envelope: Float64Array, mask: ArrayLike<number>, m: number): number {
  let re = 0;
  let im = 0;
  for (let j = 0; j < envelopePoints; j++) {
    const weight = mask[j] as number;
    if (weight === 0) continue;
    const angle = (-2 * Math.PI * m * (j + 0.5)) / envelopePoints;
    const [c, s] = [Math.cos(angle), Math.sin(angle)];
    const [x, y] = [envelope[2 * j] as number, envelope[2 * j + 1] as number];
    re += weight * (x * c - y * s);
    im += weight * (x * s + y * c);
  }
  return re * re + im * im;
}
