import { type SpeedLaw, warpedShareAt } from './SpeedLaw.js';

interface Ridge {
  law: SpeedLaw;
  /** True frequency at relative speed 1, cycles a sample. */
  nu: number;
}

const moments = 32;
const sameBins = 4;

/** Whether two lines of two laws stand at the same place in the capture at all times. */
export function isSameRidge(a: Ridge, b: Ridge): boolean {
  let squares = 0;
  for (let i = 0; i < moments; i++) {
    const time = (i + 0.5) / moments;
    squares += (placeAt(a, time) - placeAt(b, time)) ** 2;
  }
  return Math.sqrt(squares / moments) * a.law.length < sameBins;
}

function placeAt({ law, nu }: Ridge, time: number): number {
  const frequency = nu * law.speedAt(warpedShareAt(law, time));
  return Math.abs(frequency - Math.round(frequency));
}
