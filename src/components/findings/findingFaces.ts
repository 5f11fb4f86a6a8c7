import type { FindingKind, FindingSeverity } from '@shared/schemas/screening.js';
import { mdiArrowCollapseLeft, mdiHelpCircleOutline, mdiInformationOutline, mdiVectorPolylineMinus } from '@mdi/js';

export const findingLabels: Record<FindingKind, string> = {
  foldedTone: 'Folded tone',
  edgeFollowsSource: 'Edge follows the source',
  bandEdgeUnprotected: 'Band edge unprotected',
  contaminationBound: 'Contamination bound',
  clearTo: 'Clear-to frequency',
  noRollOff: 'No roll-off',
  noiseFloorLimits: 'Noise floor limits the claim',
  overSampled: 'Over-sampled',
  rateRaised: 'Rate was raised',
  clipping: 'Clipping',
  clippingHarmonics: 'Harmonics of clipping',
  dropout: 'Dropout',
  offset: 'Offset',
  coarseSteps: 'Coarse steps',
  notFinite: 'Missing numbers',
  timeStampGap: 'Gap in the time stamps',
  timeStampRepeated: 'Repeated time stamps',
  timeStampJitter: 'Jitter of the time stamps',
  irregularStamps: 'Irregular time stamps',
  rateDisagrees: 'Rates disagree',
  rateUnknown: 'Rate unknown',
  tooShort: 'Too short',
  silent: 'Silent',
  truncatedFile: 'File cut off',
  sourceAtFold: 'Source at a fold',
  companionMissing: 'Companion missing',
  foldedOrder: 'Folded order',
  reflectedSweep: 'Sweep reflected at the fold',
  ambiguousFold: 'Folded or not: ambiguous',
  foldedShare: 'Folded share measured',
  outerTriangle: 'Bispectral test',
  methodsDisagree: 'Methods disagree',
  foldedInOtherChannel: 'Folded in another channel',
};

export interface SeverityFace {
  label: string;
  icon: string;
  color: string;
}

export const severityFaces: Record<FindingSeverity, SeverityFace> = {
  fold: { label: 'Shows folding', icon: mdiVectorPolylineMinus, color: 'folded' },
  unproven: { label: 'Stops a statement', icon: mdiHelpCircleOutline, color: 'secondary' },
  limit: { label: 'Limits the claim', icon: mdiArrowCollapseLeft, color: 'caution' },
  note: { label: 'Note', icon: mdiInformationOutline, color: 'secondary' },
};
