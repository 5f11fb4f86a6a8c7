import { between, pick } from '../drawing.js';
import type { MadeCapture, MakeFamily } from '../MadeCapture.js';
import { type Component, renderComponents, steady } from '../renderComponents.js';

const frames = 4096;

/** Tones seen through uneven stamps: Poisson intervals, bursts with waits between them, a drifting clock with jitter. */
export const makeIrregular: MakeFamily = (random, isBad, index) => {
  const sampleRateHz = pick(random, [50, 200, 800]);
  const kind = (['poisson', 'bursts', 'clock_drift'] as const)[index % 3] ?? 'poisson';
  const timesS = stamps(random, sampleRateHz, kind);
  const half = sampleRateHz / 2;
  const tone = (low: number, high: number): Component =>
    steady(half * between(random, low, high), between(random, 0.4, 1), between(random, 0, 2 * Math.PI));
  const components = [tone(0.1, 0.4), tone(0.5, 0.85)];
  if (isBad) components.push(tone(1.15, 2.2));
  const made: MadeCapture = {
    family: `irregular_${kind}`,
    filter: 'none',
    sampleRateHz,
    timesS,
    ...renderComponents(components, timesS, sampleRateHz),
    evidence: 'irregular',
    signalToNoiseDb: pick(random, [10, 20, 40]),
  };
  return [made];
};

function stamps(random: () => number, rateHz: number, kind: 'poisson' | 'bursts' | 'clock_drift'): Float64Array {
  const times = new Float64Array(frames);
  let now = 0;
  for (let n = 0; n < frames; n++) {
    times[n] = now;
    if (kind === 'poisson') now -= Math.log(1 - random()) / rateHz;
    else if (kind === 'bursts') now += (n % 32 === 31 ? between(random, 20, 32) : between(random, 0.15, 0.3)) / rateHz;
    else now += ((1 + 0.05 * Math.sin((2 * Math.PI * n) / frames)) * between(random, 0.7, 1.3)) / rateHz;
  }
  // The labels speak of half the mean rate: the stamps are stretched to have exactly that.
  const stretch = (frames - 1) / rateHz / (times[frames - 1] as number);
  return times.map((time) => time * stretch);
}
