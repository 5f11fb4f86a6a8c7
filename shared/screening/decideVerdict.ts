import type { Finding, Verdict } from '../schemas/screening.js';

/**
 * Verdict precedence: folded where something is shown to be folded, unproven where something stops a statement, limited
 * where the protection ends below the band of interest or a finding limits it, otherwise clear.
 */
export function decideVerdict(findings: Finding[], confidence: number): Verdict {
  const has = (severity: Finding['severity']): boolean => findings.some((finding) => finding.severity === severity);
  if (findings.some((finding) => finding.severity === 'fold' && finding.confidence >= confidence)) return 'folded';
  if (has('unproven')) return 'unproven';
  return has('limit') ? 'limited' : 'clear';
}
