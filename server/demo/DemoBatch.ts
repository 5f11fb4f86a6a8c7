import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { PutDecision } from '../../shared/schemas/decision.js';
import type { SeededRandom } from './signals/SeededRandom.js';

export interface DemoCapture {
  fileName: string;
  /** Bytes of the file; called only when the demo is filled in. */
  make: (random: SeededRandom) => Buffer;
  acquisition?: AcquisitionSheet;
  /** What the reviewer decides once it has been screened; the others wait. */
  decision?: Pick<PutDecision, 'decision' | 'reason' | 'limitHz'>;
}

export interface DemoBatch {
  name: string;
  /** Seed of its captures. */
  seed: number;
  acquisition: AcquisitionSheet;
  /** A batch left open still receives files. */
  isComplete: boolean;
  captures: DemoCapture[];
}
