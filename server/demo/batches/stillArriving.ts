import type { DemoBatch } from '../DemoBatch.js';
import { pumpHallOne } from './pumpHallOne.js';

/** A batch that somebody is still uploading to. */
export const stillArriving: DemoBatch = {
  name: 'Pump hall 1, second visit',
  seed: 108,
  isComplete: false,
  acquisition: pumpHallOne.acquisition,
  captures: pumpHallOne.captures.slice(0, 2).map(({ fileName, make, acquisition = {} }) => ({
    fileName,
    make,
    acquisition,
  })),
};
