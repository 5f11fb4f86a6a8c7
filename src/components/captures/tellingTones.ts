import type { Tone } from '@shared/schemas/screening.js';
import { isFoldedTone } from '@/components/charts/toneFaces';

const mostShown = 24;

/** A machine can hold a hundred tones: folded ones first, then the strongest, listed by frequency. */
export function tellingTones(tones: Tone[], limit = mostShown): Tone[] {
  if (tones.length <= limit) return tones;
  const rank = (tone: Tone): number => (isFoldedTone(tone) ? 1000 : 0) + tone.levelDb;
  return [...tones]
    .sort((a, b) => rank(b) - rank(a))
    .slice(0, limit)
    .sort((a, b) => a.frequencyHz - b.frequencyHz);
}
