import type { Finding, Tone } from '../schemas/screening.js';

/** What one method says for or against folding. */
export interface FoldEvidence {
  /** Tones that the method explains or found. */
  tones: Tone[];
  findings: Finding[];
  /** Natural-log likelihood ratio that the method adds to the band edge's: above 0 speaks for folding. */
  logRatio: number;
  /** Best confidence of folded energy shown above −40 dB of the total and below 0.9·fs/2; 0 for none. */
  shownConfidence: number;
}

export const isFoldedTone = ({ explanation }: Tone): boolean =>
  explanation.startsWith('folded') || explanation === 'movedBetweenRates';

/**
 * Methods side by side: their findings together, the strongest statement of each kind, and every tone once. Where two
 * methods speak of the same tone, the one that explains it wins over one that doesn't, then the surer one.
 * @param binHz tones nearer than this are the same
 */
export function joinEvidence(parts: FoldEvidence[], binHz: number): FoldEvidence {
  const tones: Tone[] = [];
  for (const tone of parts.flatMap((part) => part.tones)) {
    const same = tones.findIndex((other) => Math.abs(other.frequencyHz - tone.frequencyHz) < binHz);
    if (same < 0) tones.push(tone);
    else if (explains(tone) > explains(tones[same] as Tone)) tones[same] = tone;
  }
  return {
    tones,
    findings: parts.flatMap(({ findings }) => findings),
    logRatio: parts.reduce((sum, { logRatio }) => sum + logRatio, 0),
    shownConfidence: Math.max(0, ...parts.map(({ shownConfidence }) => shownConfidence)),
  };
}

const explains = (tone: Tone): number =>
  (tone.explanation === 'unexplained' ? 0 : isFoldedTone(tone) ? 2 : 1) + tone.confidence;
