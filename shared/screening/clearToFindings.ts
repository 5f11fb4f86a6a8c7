import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { ClearTo } from './clearToFrequency.js';
import { formatDb, formatHz } from './formatNumber.js';

/** A capture that is more likely folded than this is not called clear, however good its band edge looks. */
const largestClearScore = 0.3;

export interface Protection extends ClearTo {
  /** Worst-case folded energy over the power in the stated band, or in the whole capture where none is stated, dB. */
  worstShareDb: number;
  /** Half the rate of the capture. */
  foldingFrequencyHz: number;
  /** Both statements are limited to what the old folding frequency allows where the rate was raised. */
  isRaised: boolean;
}

/**
 * Whether the band of interest is protected: line by line up to its end, or as a whole. A band that reaches into the guard
 * band, where a filter's skirt folds onto itself, has to be protected line by line.
 */
export function isBandProtected(
  { clearToHz, worstShareDb, foldingFrequencyHz }: Protection,
  thresholds: Thresholds,
  highestHz: number,
): boolean {
  if (clearToHz !== null && clearToHz >= highestHz) return true;
  return worstShareDb <= -thresholds.requiredProtectionDb && highestHz <= thresholds.guardStart * foldingFrequencyHz;
}

/**
 * The finding that states the clear-to frequency, or that there is none, with what it means for the verdict. The band counts
 * as protected where every part of it stands above the bound, or where all that can be folded into it is, as energy,
 * below the power in it by the protection: deep valleys and quiet stretches of a clean capture are no sign of folding.
 */
export function clearToFindings(
  protection: Protection,
  thresholds: Thresholds,
  band: [number, number],
  assumption: string,
  foldScore: number,
): Finding[] {
  const { clearToHz, marginDb, worstShareDb, isRaised } = protection;
  const asked = `${thresholds.requiredProtectionDb} dB`;
  const isProtected = isBandProtected(protection, thresholds, band[1]);
  const common = {
    confidence: thresholds.confidence,
    strengthDb: marginDb,
    evidence: {
      ...(clearToHz === null ? {} : { clearToHz }),
      marginDb,
      worstFoldedShareDb: worstShareDb,
      requiredProtectionDb: thresholds.requiredProtectionDb,
      highestOfInterestHz: band[1],
    },
    method:
      'smoothed density over the contamination bound, unbroken from the lowest frequency; the bound summed over the band',
  };
  const whole = `All that can be folded into the band is at most ${formatDb(worstShareDb)} of the power in it`;
  const findings: Finding[] = [];
  if (clearToHz === null && !isProtected) {
    findings.push({
      ...common,
      kind: 'noRollOff',
      severity: isRaised ? 'limit' : 'unproven',
      text: `Nowhere does the signal stand ${asked} above the largest contamination that the band edge allows (over the band of interest at least ${formatDb(marginDb)}): no roll-off is visible that would show a filter. ${whole}.`,
    });
  } else {
    const upTo =
      clearToHz === null
        ? `No single stretch stands ${asked} above the largest contamination that the band edge allows.`
        : `Up to ${formatHz(clearToHz)} the signal stands at least ${asked} above the largest contamination that the band edge allows, provided that ${assumption}.`;
    const reaches = clearToHz !== null && clearToHz >= band[1];
    const rest = isProtected
      ? ` ${whole}: as far as its edge tells, the band is protected as a whole, but weak components${clearToHz === null ? '' : ' further up'} stand alone.`
      : ` The band of interest reaches to ${formatHz(band[1])}.`;
    findings.push({
      ...common,
      kind: 'clearTo',
      severity: isProtected ? 'note' : 'limit',
      fromHz: band[0],
      ...(clearToHz === null ? {} : { toHz: clearToHz }),
      text: `${upTo}${reaches ? '' : rest}`,
    });
  }
  if (isProtected && foldScore > largestClearScore) {
    findings.push({
      kind: 'bandEdgeUnprotected',
      severity: 'limit',
      confidence: foldScore,
      text: `The band edge gives enough distance, but other signs of folding remain (fold score ${foldScore.toFixed(2)}): the capture is not called clear.`,
      evidence: { foldScore },
      method: 'fold score',
    });
  }
  return findings;
}
