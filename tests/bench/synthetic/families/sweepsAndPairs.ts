import { between, pick } from '../drawing.js';
import { noFilter } from '../filterGains.js';
import type { MakeFamily } from '../MadeCapture.js';
import { type Component, renderComponents, steady, uniformTimes } from '../renderComponents.js';

const frames = 16_384;

/** A sweep of exponentially rising frequency, across fs/2 when bad. */
export const makeLogSweep: MakeFamily = (random, isBad) => {
  const sampleRateHz = pick(random, [3200, 10_000, 24_000]);
  const durationS = frames / sampleRateHz;
  const half = sampleRateHz / 2;
  const fromHz = half * between(random, 0.03, 0.2);
  const toHz = half * (isBad ? between(random, 1.25, 1.95) : between(random, 0.5, 0.85));
  const rate = Math.log(toHz / fromHz) / durationS;
  const sweep: Component = {
    phase: (t) => (2 * Math.PI * fromHz * (Math.exp(rate * t) - 1)) / rate,
    frequencyHz: (t) => fromHz * Math.exp(rate * t),
    amplitude: () => 1,
  };
  return [
    {
      family: 'log_sweep',
      filter: noFilter.name,
      sampleRateHz,
      ...renderComponents([sweep], uniformTimes(frames, sampleRateHz), sampleRateHz),
      ...(isBad ? { evidence: 'moving_mirror' } : { lookalike: 'rising sweep that stays below' }),
    },
  ];
};

/** One event recorded by two loggers at unlike rates. */
export const makePair: MakeFamily = (random, isBad, index) => {
  const rates = pick(random, [
    [3200, 2560],
    [6400, 5120],
    [2000, 1600],
    [12_000, 8000],
  ]);
  const [least, highest] = [Math.min(...rates) / 2, Math.max(...rates) / 2];
  const phase = (): number => between(random, 0, 2 * Math.PI);
  const decayS = (): number => (frames / highest / 2) * between(random, 0.2, 2);
  const components = Array.from({ length: Math.floor(between(random, 4, 8)) }, () =>
    steady(between(random, 0.05, 0.85) * least, between(random, 0.2, 1), phase(), decayS()),
  );
  if (isBad)
    for (let n = 0; n < 2; n++)
      components.push(steady(highest * between(random, 1.1, 2.6), between(random, 0.15, 0.6), phase(), decayS()));
  const signalToNoiseDb = pick(random, [25, 45, 65]);
  return rates.map((sampleRateHz) => ({
    family: 'pair',
    filter: noFilter.name,
    sampleRateHz,
    ...renderComponents(components, uniformTimes(frames, sampleRateHz), sampleRateHz),
    pairId: `P${index}`,
    evidence: 'pair',
    signalToNoiseDb,
    edge: 'linesOnly' as const,
  }));
};

/** A capture whose rate was raised afterwards: samples repeated, joined by straight lines, or properly interpolated. */
export const makeRaisedRate: MakeFamily = (random, _isBad, index) => {
  const fromHz = pick(random, [1000, 2500, 8000]);
  const factor = pick(random, [2, 4]);
  const count = frames / factor;
  const half = fromHz / 2;
  // Content of the original up to 0.9 of its own folding frequency and nothing above.
  const components = Array.from({ length: 160 }, () => {
    const hz = half * between(random, 0.01, 0.9);
    return steady(hz, between(random, 0.2, 1) / Math.hypot(1, hz / (0.4 * half)), between(random, 0, 2 * Math.PI));
  });
  const original = (times: Float64Array): Float64Array => renderComponents(components, times, 1e9).rightful;
  const slow = original(uniformTimes(count, fromHz));
  const how = index % 3;
  const raised = Float64Array.from({ length: frames }, (_, n) => {
    const [at, rest] = [Math.floor(n / factor), (n % factor) / factor];
    const [value, next] = [slow[at] as number, slow[Math.min(count - 1, at + 1)] as number];
    return how === 0 ? value : value + rest * (next - value);
  });
  return [
    {
      family: `raised_${['repeated', 'linear', 'ideal'][how] ?? ''}`,
      filter: noFilter.name,
      sampleRateHz: factor * fromHz,
      rightful: how === 2 ? original(uniformTimes(frames, factor * fromHz)) : raised,
      folded: new Float64Array(frames),
      tones: [],
      raisedFromHz: fromHz,
      // Noise would have been raised with the rest: none is added afterwards.
      signalToNoiseDb: null,
    },
  ];
};
