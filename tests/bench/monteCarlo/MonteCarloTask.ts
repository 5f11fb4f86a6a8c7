import type { FindingKind } from '../../../shared/schemas/screening.js';

/** A share of the runs of one case; `index` is its place in toneCases or noiseCases. */
export interface MonteCarloTask {
  what: 'tones' | 'noise';
  index: number;
  runs: number;
  seed: number;
}

export interface MonteCarloResult {
  /** Tones drawn, and those without an estimate within half a bin (or half their spacing). */
  tones: number;
  missed: number;
  /** Σ (error over its own Cramér-Rao bound)² over the others. */
  squares: number;
  /** Noise: captures with a finding of the kind at the confidence asked for, and those called folded. */
  kinds: Partial<Record<FindingKind, number>>;
  calledFolded: number;
}
