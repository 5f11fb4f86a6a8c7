import type { DecisionDto, DecisionKind } from '@shared/schemas/decision.js';
import { formatFrequency } from '@/utils/formatFrequency';

export const decisionLabels: Record<DecisionKind, string> = {
  accept: 'Accept',
  acceptTo: 'Accept up to a frequency',
  retake: 'Ask for a retake',
  exclude: 'Leave out',
};

const past: Record<DecisionKind, string> = {
  accept: 'Accepted',
  acceptTo: 'Accepted up to',
  retake: 'Retake asked',
  exclude: 'Left out',
};

/** `Accepted up to 310 Hz`. */
export function decisionText({ decision, limitHz }: Pick<DecisionDto, 'decision' | 'limitHz'>): string {
  return limitHz === null ? past[decision] : `${past[decision]} ${formatFrequency(limitHz)}`;
}
