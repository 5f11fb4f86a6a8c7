import { describe, expect, it } from 'vitest';
import { phaseTrack } from '../../../worker/dsp/phaseTrack.js';
import { refineTones } from '../../../worker/dsp/refineTones.js';
import { ToneDemodulator } from '../../../worker/dsp/ToneDemodulator.js';

const fs = 1000;
const count = 8192;

/** The track of a line at the given multiple of a 30 Hz shaft whose phase swings by 0.02 rad, twice over the capture. */
function trackOf(multiple: number, foldedAbout: number): number[] {
  const phase = (n: number): number => (2 * Math.PI * 30 * n) / fs + 0.02 * Math.sin((2 * Math.PI * 2 * n) / count);
  const samples = Float64Array.from({ length: count }, (_, n) => Math.cos(multiple * phase(n)));
  const startHz = Math.abs(foldedAbout - multiple * 30);
  const demodulator = new ToneDemodulator([(2 * Math.PI * (startHz + 0.01)) / fs], 64, count / 64);
  demodulator.push(samples, count, 0, 0);
  const [tone] = refineTones(demodulator, (2 * Math.PI * 1) / fs);
  return tone === undefined ? [] : (phaseTrack(demodulator, tone, 1e-6)?.phasesRad ?? []);
}

const slope = (track: number[], reference: number[]): number =>
  track.reduce((sum, value, n) => sum + value * (reference[n] ?? 0), 0) /
  reference.reduce((sum, value) => sum + value * value, 0);

describe('phaseTrack', () => {
  const first = trackOf(1, 0);

  it('is as many times as large as the multiple', () => {
    expect(first).toHaveLength(32);
    expect(slope(trackOf(5, 0), first)).toBeCloseTo(5, 1);
  });

  // Worked by hand: 20 × 30 Hz = 600 Hz lands on 400 Hz at 1000 Hz; cos(20φ) sampled is cos(2πn − 20φ): upside down.
  it('is upside down in the second zone and upright in the third', () => {
    expect(slope(trackOf(20, 1000), first)).toBeCloseTo(-20, 0);
    expect(slope(trackOf(36, 1000), first)).toBeCloseTo(36, 0);
  });

  it('is missing where the tone fades into the noise', () => {
    const demodulator = new ToneDemodulator([(2 * Math.PI * 30) / fs], 64, count / 64);
    demodulator.push(
      Float64Array.from(
        { length: count },
        (_, n) => Math.exp((-20 * n) / count) * Math.cos((2 * Math.PI * 30 * n) / fs),
      ),
      count,
      0,
      0,
    );
    const [tone] = refineTones(demodulator, (2 * Math.PI * 1) / fs);
    expect(tone === undefined ? 'none' : phaseTrack(demodulator, tone, 1)).toBeNull();
  });
});
