import { twoRates } from '../../server/demo/batches/twoRates.js';
import { SeededRandom } from '../../server/demo/signals/SeededRandom.js';

function make(index: number): Buffer {
  const capture = twoRates.captures[index];
  if (!capture) throw new Error(`The demo has no pair with a capture ${index}.`);
  return capture.make(new SeededRandom(700 + index));
}

/** The same machine at 1000 and at 1280 Hz: its line at 734.2 Hz stands at 265.8 Hz in one, at 545.8 Hz in the other. */
export const pairBytes = { slow: make(0), fast: make(1) };
