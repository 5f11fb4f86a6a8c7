import type { Envelope } from './Envelope.js';
import type { Plateau, RunAccumulator } from './RunAccumulator.js';

export interface Clipping {
  samples: number;
  runs: number;
  plateaus: Plateau[];
}

/**
 * Plateaus that are clipping: several flat tops at exactly one value, entered and left by more than a few quantisation steps
 * (a slow rounded peak changes by single steps), and nothing beyond that value between the first and the last of them.
 */
export function findClipping(runs: RunAccumulator, envelope: Envelope, quantum: number | null): Clipping {
  const plateaus = [...runs.plateaus.values()].filter((plateau) => {
    if (plateau.runs < 3) return false;
    if (quantum !== null && plateau.stepSum / plateau.runs < 3 * quantum) return false;
    const tolerance = 1e-9 * Math.abs(plateau.value);
    return plateau.side === 1
      ? envelope.maximumOver(plateau.firstFrame, plateau.lastFrame) <= plateau.value + tolerance
      : envelope.minimumOver(plateau.firstFrame, plateau.lastFrame) >= plateau.value - tolerance;
  });
  return {
    samples: plateaus.reduce((sum, plateau) => sum + plateau.samples, 0),
    runs: plateaus.reduce((sum, plateau) => sum + plateau.runs, 0),
    plateaus,
  };
}
