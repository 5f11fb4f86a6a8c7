import type { Finding } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import type { ClearTo } from './clearToFrequency.js';
import { formatDb, formatHz } from './formatNumber.js';

/** A capture that is more likely folded than this is not called clear, however good its band edge looks. */
const largestClearScore = 0.3;

/** The finding that states the clear-to frequency, or that there is none, with what it means for the verdict. */
export function clearToFindings(
  { clearToHz, marginDb }: ClearTo,
  thresholds: Thresholds,
  band: [number, number],
  assumption: string,
  foldScore: number,
): Finding[] {
  const protection = `${thresholds.requiredProtectionDb} dB`;
  const common = {
    confidence: thresholds.confidence,
    method: 'smoothed density over the contamination bound, unbroken from the lowest frequency',
  };
  if (clearToHz === null) {
    return [
      {
        ...common,
        kind: 'noRollOff',
        severity: 'unproven',
        strengthDb: marginDb,
        text: `Nowhere does the signal stand ${protection} above the largest contamination that the band edge allows (over the band of interest at least ${formatDb(marginDb)}): no roll-off is visible that would show a filter.`,
        evidence: { marginDb, requiredProtectionDb: thresholds.requiredProtectionDb, highestOfInterestHz: band[1] },
      },
    ];
  }
  const reaches = clearToHz >= band[1];
  const findings: Finding[] = [
    {
      ...common,
      kind: 'clearTo',
      severity: reaches ? 'note' : 'limit',
      fromHz: band[0],
      toHz: clearToHz,
      strengthDb: marginDb,
      text: `Up to ${formatHz(clearToHz)} the signal stands at least ${protection} above the largest contamination that the band edge allows, provided that ${assumption}.${reaches ? '' : ` The band of interest reaches to ${formatHz(band[1])}.`}`,
      evidence: {
        clearToHz,
        marginDb,
        requiredProtectionDb: thresholds.requiredProtectionDb,
        highestOfInterestHz: band[1],
      },
    },
  ];
  if (reaches && foldScore > largestClearScore) {
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
