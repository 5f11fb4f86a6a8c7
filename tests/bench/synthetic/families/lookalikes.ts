import { between, gaussian, pick } from '../drawing.js';
import { firDecimator, noFilter } from '../filterGains.js';
import type { MadeCapture, MakeFamily } from '../MadeCapture.js';
import { type Component, orderOf, renderComponents, steady, uniformTimes } from '../renderComponents.js';
import { foldedDensity, overSampling, sampleFast } from '../sampleFast.js';

const frames = 16_384;

type Draw = (random: () => number, sampleRateHz: number, durationS: number) => Component[];

const phase = (random: () => number): number => between(random, 0, 2 * Math.PI);
const linearSweep = (fromHz: number, toHz: number, durationS: number): Component => ({
  phase: (t) => 2 * Math.PI * (fromHz * t + ((toHz - fromHz) * t * t) / 2 / durationS),
  frequencyHz: (t) => fromHz + ((toHz - fromHz) * t) / durationS,
  amplitude: () => 1,
});

/** Clean signals that look wrong, made of sinusoids; none of them reaches fs/2. */
const drawn: Record<string, { isSteady: boolean; draw: Draw }> = {
  'tone right below fs/2': {
    isSteady: true,
    draw: (random, rate) => [
      steady(rate * between(random, 0.475, 0.498), between(random, 0.05, 0.5), phase(random)),
      steady(rate * between(random, 0.02, 0.1), 1, phase(random)),
    ],
  },
  'stiff string': {
    isSteady: true,
    draw: (random, rate, durationS) => {
      const [firstHz, stiffness] = [rate * between(random, 0.01, 0.02), between(random, 2e-4, 2e-3)];
      return Array.from({ length: 60 }, (_, n) => (n + 1) * Math.sqrt(1 + stiffness * (n + 1) ** 2) * firstHz)
        .filter((hz) => hz < 0.47 * rate)
        .map((hz, n) =>
          steady(hz, between(random, 0.3, 1) / (n + 1), phase(random), (durationS * 0.5) / Math.sqrt(n + 1)),
        );
    },
  },
  bell: {
    isSteady: true,
    draw: (random, rate, durationS) => {
      const baseHz = rate * between(random, 0.02, 0.05);
      return [0.5, 1, 1.2, 1.5, 2, 2.61, 3.07, 4.2, 5.6, 7.1]
        .filter((ratio) => ratio * baseHz < 0.47 * rate)
        .map((ratio) =>
          steady(ratio * baseHz, between(random, 0.2, 1), phase(random), durationS * between(random, 0.05, 0.4)),
        );
    },
  },
  'falling sweep': {
    isSteady: false,
    draw: (random, rate, durationS) => [
      linearSweep(rate * between(random, 0.38, 0.46), rate * between(random, 0.03, 0.15), durationS),
    ],
  },
  'crossing sweeps': {
    isSteady: false,
    draw: (random, rate, durationS) => {
      const [low, high] = [rate * between(random, 0.03, 0.1), rate * between(random, 0.3, 0.44)];
      return [linearSweep(low, high, durationS), linearSweep(high, low, durationS)];
    },
  },
  Doppler: {
    isSteady: false,
    // A source that passes: f = f0/(1 + v·t'/sqrt(t'² + (d/c)²)), here to first order in v/c.
    draw: (random, rate, durationS) => {
      const [speed, pass] = [between(random, 0.05, 0.15), durationS * between(random, 0.03, 0.1)];
      const path = (t: number): number => Math.hypot(t - durationS / 2, pass);
      const source: Pick<Component, 'phase' | 'frequencyHz'> = {
        phase: (t) => 2 * Math.PI * (t - speed * path(t)),
        frequencyHz: (t) => 1 - (speed * (t - durationS / 2)) / path(t),
      };
      const baseHz = rate * between(random, 0.06, 0.1);
      return [1, 2, 3, 4].map((k) => orderOf(source, k * baseHz, 1 / k, phase(random)));
    },
  },
  'two machines': {
    isSteady: false,
    draw: (random, rate, durationS) =>
      [between(random, 12, 30), between(random, 31, 60)].flatMap((speedHz) => {
        const driftHz = speedHz * between(random, -0.02, 0.02);
        const shaft = {
          phase: (t: number) => 2 * Math.PI * (speedHz * t + (driftHz * t * t) / 2 / durationS),
          frequencyHz: (t: number) => speedHz + (driftHz * t) / durationS,
        };
        const orders = Math.floor((0.4 * rate) / speedHz / 1.05);
        return Array.from({ length: orders }, (_, n) =>
          orderOf(shaft, n + 1, between(random, 0.3, 1) / (n + 1), phase(random)),
        );
      }),
  },
  'amplitude-modulated pair': {
    isSteady: true,
    draw: (random, rate) => {
      const modulationHz = rate * between(random, 0.004, 0.01);
      return [between(random, 0.1, 0.2), between(random, 0.28, 0.4)].flatMap((place) =>
        [-1, 0, 1].map((side) => steady(place * rate + side * modulationHz, side === 0 ? 1 : 0.35, phase(random))),
      );
    },
  },
  'converter spurs': {
    isSteady: true,
    // Two converters taking turns: an image of each line at fs/2 − f, and a line at fs/4 from four.
    draw: (random, rate) => {
      const toneHz = rate * between(random, 0.05, 0.2);
      const mismatch = 10 ** between(random, -3, -2);
      return [
        steady(toneHz, 1, phase(random)),
        steady(2 * toneHz, 0.1, phase(random)),
        steady(rate / 2 - toneHz, mismatch, phase(random)),
        steady(rate / 4, mismatch / 2, phase(random)),
      ];
    },
  },
};

/** Look-alikes of the second kind: noise in a band that ends steeply right below fs/2. */
const noisy: Record<string, (hz: number, rate: number) => number> = {
  'filtered white noise, flat floor': () => 1,
  'resonance at the edge': (hz, rate) => 0.05 + 1 / Math.hypot(1 - (hz / (0.45 * rate)) ** 2, 0.03),
};

const names = [...Object.keys(drawn), ...Object.keys(noisy)];

/** One capture of each look-alike; all clean. */
export const makeLookalikes: MakeFamily = (random) =>
  names.map((lookalike): MadeCapture => {
    const sampleRateHz = pick(random, [2560, 5120, 10_240]);
    const kind = drawn[lookalike];
    if (kind !== undefined) {
      const components = kind.draw(random, sampleRateHz, frames / sampleRateHz);
      return {
        family: 'lookalike',
        lookalike,
        filter: noFilter.name,
        sampleRateHz,
        ...renderComponents(components, uniformTimes(frames, sampleRateHz), sampleRateHz),
        ...(kind.isSteady ? { edge: 'linesOnly' as const } : {}),
      };
    }
    const filter = firDecimator(0.455 * sampleRateHz, 0.498 * sampleRateHz, sampleRateHz);
    const shape = (hz: number): number => noisy[lookalike]?.(hz, sampleRateHz) ?? 1;
    return {
      family: 'lookalike',
      lookalike,
      filter: filter.name,
      sampleRateHz,
      ...sampleFast(gaussian(random, frames * overSampling), sampleRateHz, filter, shape),
      tones: [],
      signalToNoiseDb: null,
      edge: 'ofSignal',
      density: foldedDensity(sampleRateHz, filter, shape),
    };
  });
