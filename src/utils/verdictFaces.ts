import type { Verdict } from '@shared/schemas/screening.js';
import { mdiCheckDecagramOutline, mdiHelpCircleOutline, mdiArrowCollapseLeft, mdiVectorPolylineMinus } from '@mdi/js';

export interface VerdictFace {
  label: string;
  icon: string;
  color: string;
  /** What the verdict says, and no more. */
  meaning: string;
}

/** Word, shape and colour of each verdict; the colour is never the only one to carry it. */
export const verdictFaces: Record<Verdict, VerdictFace> = {
  folded: {
    label: 'Folded',
    icon: mdiVectorPolylineMinus,
    color: 'folded',
    meaning: 'Energy from beyond the folding frequency is shown to lie in this capture.',
  },
  unproven: {
    label: 'Unproven',
    icon: mdiHelpCircleOutline,
    color: 'secondary',
    meaning: 'This capture cannot show whether it is free of folded energy; the findings say why.',
  },
  limited: {
    label: 'Limited',
    icon: mdiArrowCollapseLeft,
    color: 'caution',
    meaning: 'Protected only up to the clear-to frequency.',
  },
  clear: {
    label: 'Clear',
    icon: mdiCheckDecagramOutline,
    color: 'protected',
    meaning: 'No evidence of folding was found and the band of interest is protected. This is no proof of absence.',
  },
};
