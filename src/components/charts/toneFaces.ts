import type { Tone, toneExplanations } from '@shared/schemas/screening.js';
import type { PointStyle } from 'chart.js';

type Explanation = (typeof toneExplanations)[number];

export interface ToneFace {
  label: string;
  point: PointStyle;
  isFolded: boolean;
}

/** Each explanation has a word and a shape of its own; colour only repeats what the shape says. */
export const toneFaces: Record<Explanation, ToneFace> = {
  knownSource: { label: 'Known source', point: 'circle', isFolded: false },
  harmonic: { label: 'Harmonic', point: 'rect', isFolded: false },
  supply: { label: 'Supply', point: 'rectRot', isFolded: false },
  image: { label: 'Image of raising the rate', point: 'star', isFolded: false },
  unexplained: { label: 'Unexplained', point: 'cross', isFolded: false },
  foldedSource: { label: 'Folded source', point: 'triangle', isFolded: true },
  foldedHarmonic: { label: 'Folded harmonic', point: 'triangle', isFolded: true },
  foldedOrder: { label: 'Folded order', point: 'triangle', isFolded: true },
  movedBetweenRates: { label: 'Moved between two rates', point: 'triangle', isFolded: true },
};

export const isFoldedTone = (tone: Tone): boolean => toneFaces[tone.explanation].isFolded;
