import type { MadeTone } from './MadeCapture.js';

/** A sinusoid of changing frequency and level, exact at any time: phase in rad, frequency (its derivative over 2π) in Hz. */
export interface Component {
  phase: (timeS: number) => number;
  frequencyHz: (timeS: number) => number;
  amplitude: (timeS: number) => number;
}

/** A path that stays within this share of fs counts as a line. */
const steadyShare = 0.002;

export function steady(frequencyHz: number, amplitude: number, phase: number, decayS?: number): Component {
  return {
    phase: (timeS) => 2 * Math.PI * frequencyHz * timeS + phase,
    frequencyHz: () => frequencyHz,
    amplitude: decayS === undefined ? () => amplitude : (timeS) => amplitude * Math.exp(-timeS / decayS),
  };
}

/** The order k of a shaft whose phase and speed are given: k·φ(t). */
export function orderOf(
  shaft: Pick<Component, 'phase' | 'frequencyHz'>,
  k: number,
  amplitude: number,
  phase: number,
): Component {
  return {
    phase: (timeS) => k * shaft.phase(timeS) + phase,
    frequencyHz: (timeS) => k * shaft.frequencyHz(timeS),
    amplitude: () => amplitude,
  };
}

/**
 * Samples components at the given times, each value put to the folded part while its frequency is at or beyond fs/2.
 * @param gain magnitude of the filter in front of the converter
 */
export function renderComponents(
  components: readonly Component[],
  timesS: Float64Array,
  sampleRateHz: number,
  gain: (frequencyHz: number) => number = () => 1,
): { rightful: Float64Array; folded: Float64Array; tones: MadeTone[] } {
  const rightful = new Float64Array(timesS.length);
  const folded = new Float64Array(timesS.length);
  const tones: MadeTone[] = [];
  for (const { phase, frequencyHz, amplitude } of components) {
    const beyond: number[] = [];
    let energy = 0;
    timesS.forEach((timeS, n) => {
      const hz = Math.abs(frequencyHz(timeS));
      const value = amplitude(timeS) * gain(hz) * Math.sin(phase(timeS));
      const target = hz >= sampleRateHz / 2 ? folded : rightful;
      target[n] = (target[n] as number) + value;
      if (target === rightful) return;
      beyond.push(hz);
      energy += value * value;
    });
    if (energy === 0) continue;
    beyond.sort((a, b) => a - b);
    const [low, middle, high] = [beyond[0], beyond[beyond.length >> 1], beyond[beyond.length - 1]] as [
      number,
      number,
      number,
    ];
    const isSteady = high - low < steadyShare * sampleRateHz;
    tones.push({
      trueHz: isSteady ? middle : high,
      foldedHz: isSteady ? Math.abs(middle - sampleRateHz * Math.round(middle / sampleRateHz)) : null,
      levelDb: 10 * Math.log10(energy / timesS.length),
    });
  }
  return { rightful, folded, tones: tones.sort((a, b) => b.levelDb - a.levelDb) };
}

export function uniformTimes(count: number, sampleRateHz: number): Float64Array {
  return Float64Array.from({ length: count }, (_, n) => n / sampleRateHz);
}
