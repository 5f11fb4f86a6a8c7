import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { formatDb, formatHz } from './formatNumber.js';

/** Only what is shown beyond doubt contradicts another method. */
const shownFrom = 0.95;

/**
 * A contradiction between methods is shown, not hidden: folded energy shown although the band edge bounds it far lower, or
 * a band edge that follows the source although a companion at another rate shows nothing folded. The verdict stays with the
 * precedence of the evidence (something shown outweighs an assumption); the reader learns which assumption must be wrong.
 */
export function methodsDisagree(
  findings: Finding[],
  thresholds: Thresholds,
  { isProtected, worstShareDb }: { isProtected: boolean; worstShareDb: number },
): Finding[] {
  const shown = findings.filter(({ severity, confidence }) => severity === 'fold' && confidence >= shownFrom);
  const tone = shown.find(({ kind }) => kind === 'foldedTone' || kind === 'foldedOrder' || kind === 'reflectedSweep');
  const follows = shown.find(({ kind }) => kind === 'edgeFollowsSource');
  const disagreements: Finding[] = [];
  if (tone !== undefined && isProtected) {
    disagreements.push({
      kind: 'methodsDisagree',
      severity: 'note',
      confidence: tone.confidence,
      ...(tone.frequencyHz === undefined ? {} : { frequencyHz: tone.frequencyHz }),
      text: `The band edge alone would allow at most ${formatDb(worstShareDb)} of folded energy, yet ${tone.frequencyHz === undefined ? 'folded energy' : `the component at ${formatHz(tone.frequencyHz)}`} is shown to be folded: beyond fs/2 the source is not lower than next to it, so the bound does not hold for this capture.`,
      evidence: { worstFoldedShareDb: worstShareDb, requiredProtectionDb: thresholds.requiredProtectionDb },
      method: 'folded components against the contamination bound',
    });
  }
  const unmoved = findings.find(({ kind, evidence }) => kind === 'foldedShare' && evidence['showsNothing'] === true);
  if (follows !== undefined && unmoved !== undefined) {
    disagreements.push({
      kind: 'methodsDisagree',
      severity: 'note',
      confidence: follows.confidence,
      text: 'The band edge follows the source as if it went on beyond fs/2, but the companion at another rate shows nothing folded. Look at both captures before deciding: they may not hold the same event.',
      evidence: unmoved.evidence,
      method: 'band edge over time against the companion',
    });
  }
  return disagreements;
}
