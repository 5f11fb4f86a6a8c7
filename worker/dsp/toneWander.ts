import type { RefinedTone } from './RefinedTone.js';
import type { ToneDemodulator } from './ToneDemodulator.js';

const parts = 8;

/**
 * Standard deviation of a tone's frequency over eighths of the capture beyond what noise explains, rad a sample.
 * @param noisePower expected |noise|² of one demodulated block
 * @returns 0 where the spread is no larger than three times the one that noise alone gives
 */
export function toneWander(demodulator: ToneDemodulator, tone: RefinedTone, noisePower: number): number {
  const perPart = Math.floor(demodulator.blocks / parts);
  if (perPart < 4) return 0;
  const { blockFrames } = demodulator;
  const slopes: { slope: number; variance: number }[] = [];
  for (let part = 0; part < parts; part++) {
    let real = 0;
    let imaginary = 0;
    let power = 0;
    const at = (block: number): [number, number] => {
      const time = block * blockFrames + (blockFrames - 1) / 2 - demodulator.origin;
      const [c, s] = [Math.cos(tone.delta * time), Math.sin(tone.delta * time)];
      const [x, y] = [tone.residual[2 * block] as number, tone.residual[2 * block + 1] as number];
      return [x * c + y * s, y * c - x * s];
    };
    for (let block = part * perPart; block < (part + 1) * perPart - 1; block++) {
      const [a, b] = at(block);
      const [c, d] = at(block + 1);
      real += c * a + d * b;
      imaginary += d * a - c * b;
      power += a * a + b * b;
    }
    const mean = power / (perPart - 1);
    if (mean < 4 * noisePower) continue;
    slopes.push({
      slope: Math.atan2(imaginary, real) / blockFrames,
      variance: noisePower / mean / ((perPart - 1) ** 2 * blockFrames ** 2),
    });
  }
  if (slopes.length < 3) return 0;
  const mean = slopes.reduce((sum, { slope }) => sum + slope, 0) / slopes.length;
  const seen = slopes.reduce((sum, { slope }) => sum + (slope - mean) ** 2, 0) / (slopes.length - 1);
  const expected = slopes.reduce((sum, { variance }) => sum + variance, 0) / slopes.length;
  return seen > 9 * expected ? Math.sqrt(seen - expected) : 0;
}
