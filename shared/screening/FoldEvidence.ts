import type { Finding, Tone } from '../schemas/screening.js';

/** What one method says for or against folding. */
export interface FoldEvidence {
  /** Tones that the method explains or found; a frequency appears once over all methods. */
  tones: Tone[];
  findings: Finding[];
  /** Natural-log likelihood ratio that the method adds to the band edge's: above 0 speaks for folding. */
  logRatio: number;
  /** Best confidence of folded energy shown above −40 dB of the total and below 0.9·fs/2; 0 for none. */
  shownConfidence: number;
}

/** Methods side by side: their findings together, the strongest statement of each kind. */
export function joinEvidence(parts: FoldEvidence[]): FoldEvidence {
  return {
    tones: parts.flatMap(({ tones }) => tones),
    findings: parts.flatMap(({ findings }) => findings),
    logRatio: parts.reduce((sum, { logRatio }) => sum + logRatio, 0),
    shownConfidence: Math.max(0, ...parts.map(({ shownConfidence }) => shownConfidence)),
  };
}
