import { describe, expect, it } from 'vitest';
import { warpedShareAt } from '../../../../worker/dsp/warp/SpeedLaw.js';
import { speedFromChannel } from '../../../../worker/dsp/warp/speedFromChannel.js';
import { seededNoise } from '../../../support/seededNoise.js';

const length = 20_000;
const speed = (tau: number): number => 1 + 0.3 * tau;
const noise = seededNoise(length, 6);
let turns = 0.4;
const phases = Float64Array.from({ length }, (_, n) => (turns += 0.006 * speed((2 * n) / length - 1)));
const pulses = phases.map((phase, n) => (phase - Math.floor(phase) < 0.1 ? 5 : 0) + 0.02 * (noise[n] as number));

describe('speedFromChannel', () => {
  it('takes the speed law from a pulse train, whichever way the pulses point', () => {
    for (const sign of [1, -1]) {
      const found = speedFromChannel(
        pulses.map((value) => sign * value),
        '',
      );
      expect(found?.pulses).toBeGreaterThan(115);
      expect(found?.pulses).toBeLessThan(122);
      for (const time of [0.1, 0.4, 0.6, 0.9]) {
        const law = found?.law;
        expect(law === undefined ? 0 : law.speedAt(warpedShareAt(law, time))).toBeCloseTo(speed(2 * time - 1), 1);
      }
    }
  });

  it('takes it from a voltage only where the name says so', () => {
    const voltage = phases.map((_, n) => 2 * speed((2 * n) / length - 1) + 0.01 * (noise[n] as number));
    const found = speedFromChannel(voltage, 'Speed shaft A');
    expect(found?.pulses).toBeNull();
    expect(found?.law.speedAt(0.5)).toBeCloseTo(1.044, 1);
    expect(speedFromChannel(voltage, 'Temperature')).toBeNull();
  });

  it('takes vibration and noise for no speed', () => {
    expect(speedFromChannel(noise, '')).toBeNull();
    expect(
      speedFromChannel(
        phases.map((phase) => Math.sin(2 * Math.PI * phase)),
        '',
      ),
    ).toBeNull();
  });
});
