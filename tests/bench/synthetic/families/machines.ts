import { between, pick } from '../drawing.js';
import { noFilter, strongFilter } from '../filterGains.js';
import type { MadeCapture, MakeFamily } from '../MadeCapture.js';
import { type Component, orderOf, renderComponents, uniformTimes } from '../renderComponents.js';

const frames = 16_384;
type Shaft = Pick<Component, 'phase' | 'frequencyHz'>;

/** Speed that swings by one sine, or wanders by a few of unlike periods: f0·(1 + Σ d·sin(2πt/P + θ)). */
export const makeWander: MakeFamily = (random, isBad, index) => {
  const sampleRateHz = pick(random, [1280, 2560, 3200, 5120]);
  const durationS = frames / sampleRateHz;
  const speedHz = between(random, 14, 45);
  const depth = 10 ** between(random, -3.5, -1.8);
  const isRandom = index % 4 > 1;
  const swings = Array.from({ length: isRandom ? 6 : 1 }, (_, n) => ({
    depth: isRandom ? depth / (n + 1) : depth,
    periodS: (durationS * between(random, 0.3, 0.9)) / (n + 1),
    angle: between(random, 0, 2 * Math.PI),
  }));
  const shaft: Shaft = {
    phase: (t) =>
      2 * Math.PI * speedHz * t -
      swings.reduce(
        (sum, one) => sum + speedHz * one.depth * one.periodS * Math.cos((2 * Math.PI * t) / one.periodS + one.angle),
        0,
      ),
    frequencyHz: (t) =>
      speedHz *
      (1 + swings.reduce((sum, one) => sum + one.depth * Math.sin((2 * Math.PI * t) / one.periodS + one.angle), 0)),
  };
  const rmsHz = speedHz * Math.sqrt(swings.reduce((sum, one) => sum + one.depth ** 2 / 2, 0));
  return [
    machine(random, isBad, {
      family: isRandom ? 'wander_random' : 'wander_sine',
      sampleRateHz,
      shaft,
      topHz: speedHz,
      wanderHz: rmsHz,
    }),
  ];
};

/** A shaft that runs down: f0·exp(−t/τ); its orders come down through the folding frequency. */
export const makeCoastDown: MakeFamily = (random, isBad) => {
  const sampleRateHz = pick(random, [1280, 2560, 5120]);
  const durationS = frames / sampleRateHz;
  const speedHz = between(random, 25, 60);
  const decayS = durationS * between(random, 0.8, 2);
  const shaft: Shaft = {
    phase: (t) => 2 * Math.PI * speedHz * decayS * (1 - Math.exp(-t / decayS)),
    frequencyHz: (t) => speedHz * Math.exp(-t / decayS),
  };
  return [
    machine(random, isBad, { family: 'coast_down', sampleRateHz, shaft, topHz: speedHz, wanderHz: speedHz * 0.2 }),
  ];
};

/** Gear mesh with side-bands at the shaft's speed, steady or drifting a little. */
export const makeGear: MakeFamily = (random, isBad, index) => {
  const sampleRateHz = pick(random, [2048, 4096, 6400]);
  const durationS = frames / sampleRateHz;
  const teeth = Math.floor(between(random, 17, 43));
  const meshes = isBad ? 4 : 2;
  const speedHz = ((sampleRateHz / 2) * between(random, 0.31, 0.42)) / teeth;
  const driftHz = index % 4 > 1 ? speedHz * between(random, 0.005, 0.02) : 0;
  const shaft: Shaft = {
    phase: (t) => 2 * Math.PI * (speedHz * t + (driftHz * t * t) / 2 / durationS),
    frequencyHz: (t) => speedHz + (driftHz * t) / durationS,
  };
  const components: Component[] = [];
  for (let mesh = 1; mesh <= meshes; mesh++) {
    for (let side = -3; side <= 3; side++) {
      const amplitude = (between(random, 0.5, 1) / mesh) * 0.35 ** Math.abs(side);
      components.push(orderOf(shaft, mesh * teeth + side, amplitude, between(random, 0, 2 * Math.PI)));
    }
  }
  for (let order = 1; order <= 3; order++) components.push(orderOf(shaft, order, between(random, 0.1, 0.4), 0));
  const evidence =
    isBad && (sampleRateHz / speedHz) * driftHz * 0.29 * durationS >= 3 ? { evidence: 'moving_mirror' } : {};
  return [
    {
      family: 'gear',
      filter: noFilter.name,
      sampleRateHz,
      ...renderComponents(components, uniformTimes(frames, sampleRateHz), sampleRateHz),
      ...(driftHz === 0 ? { edge: 'linesOnly' as const } : evidence),
    },
  ];
};

/** Supply harmonics of an odd kind: 60 Hz, 16.7 Hz railway, 400 Hz aircraft. */
export const makeSupply: MakeFamily = (random, isBad) => {
  const supplyHz = pick(random, [60, 16.7, 400]) * (1 + 1e-3 * between(random, -1, 1));
  const sampleRateHz = Math.round(supplyHz * between(random, 21, 29));
  const highest = isBad ? 37 : 9;
  const tilt = between(random, 0.8, 1.5);
  const shaft: Shaft = { phase: (t) => 2 * Math.PI * supplyHz * t, frequencyHz: () => supplyHz };
  const components: Component[] = [];
  for (let order = 1; order <= highest; order += 2)
    components.push(orderOf(shaft, order, order ** -tilt, between(random, 0, 2 * Math.PI)));
  return [
    {
      family: 'supply',
      filter: noFilter.name,
      sampleRateHz,
      ...renderComponents(components, uniformTimes(frames, sampleRateHz), sampleRateHz),
      edge: 'linesOnly',
    },
  ];
};

/** All orders up to beyond fs/2 without a filter when bad; a strong filter, or few orders, otherwise. */
function machine(
  random: () => number,
  isBad: boolean,
  given: { family: string; sampleRateHz: number; shaft: Shaft; topHz: number; wanderHz: number },
): MadeCapture {
  const { family, sampleRateHz, shaft, topHz, wanderHz } = given;
  const half = sampleRateHz / 2;
  const reach = isBad ? between(random, 1.25, 2.3) : between(random, 0.5, 2);
  // At full speed a filter corner far enough down leaves nothing of the orders beyond fs/2 that the labels would see.
  const filter = isBad ? noFilter : strongFilter(random, sampleRateHz);
  const orders = Math.max(5, Math.floor((half * reach) / topHz));
  const tilt = between(random, 0.4, 1);
  const components = Array.from({ length: orders }, (_, n) =>
    orderOf(shaft, n + 1, between(random, 0.3, 1) * (n + 1) ** -tilt, between(random, 0, 2 * Math.PI)),
  );
  const durationS = frames / sampleRateHz;
  // A folded order k and the order j that it crosses: k + j is fs over the speed. Below 3 turns they can't be told apart.
  const isTold = ((2 * half) / topHz) * wanderHz * durationS >= 3;
  return {
    family,
    filter: filter.name,
    sampleRateHz,
    ...renderComponents(components, uniformTimes(frames, sampleRateHz), sampleRateHz, filter.gain),
    ...(isBad && isTold ? { evidence: 'moving_mirror' } : {}),
  };
}
