import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { recordingOf } from '../sets/LabelledCapture.js';
import { bootstrapLimits, type Limits } from '../statistics/bootstrapLimits.js';
import { byFallingScore, type RocFigures, rocFigures } from '../statistics/rocFigures.js';
import type { ScreeningMethod } from './screeningMethods.js';
import { type ShareFigure, shareFigure } from './shareFigure.js';

export const parts = ['all', 'real', 'synthetic'] as const;
export type Part = (typeof parts)[number];

/** Kinds of evidence that prove folding if a method looks for it. */
export const provableEvidence = ['tone', 'moving_mirror', 'pair', 'irregular'] as const;

export interface RocWithLimits extends RocFigures {
  folded: number;
  clean: number;
  limits: Record<keyof RocFigures, Limits>;
}

export interface MethodFigures {
  name: string;
  /** With captures that show nothing (evidence "weak") left out, and with them. */
  roc: Record<Part, RocWithLimits>;
  rocWithWeak: Record<Part, RocWithLimits>;
  cleanCalledFolded: ShareFigure;
  cleanCalledClear: ShareFigure;
  foldedCalledFolded: ShareFigure;
  foldedCalledClear: ShareFigure;
  foldedCalledClearWithWeak: ShareFigure;
  provableCalledFolded: ShareFigure;
}

export const hasSomethingToSee = ({ truth }: ScreenedCapture): boolean =>
  truth.evidence !== 'weak' && truth.evidence !== 'none';
export const isFolded = ({ truth }: ScreenedCapture): boolean => truth.label === 'folded';
export const isClean = ({ truth }: ScreenedCapture): boolean => truth.label === 'clean';
export const isProvable = (capture: ScreenedCapture): boolean =>
  isFolded(capture) && provableEvidence.some((one) => one === capture.truth.evidence);

/** Grey captures and those about which nothing can be said (na) are left out. */
export function methodFigures(all: readonly ScreenedCapture[], method: ScreeningMethod): MethodFigures {
  const captures = all.filter(method.isFor);
  const folded = captures.filter(isFolded);
  const clean = captures.filter(isClean);
  const seen = folded.filter(hasSomethingToSee);
  const rocOf = (positives: readonly ScreenedCapture[]): Record<Part, RocWithLimits> => {
    const of = (part: Part): RocWithLimits => {
      const isIn = ({ truth }: ScreenedCapture): boolean => part === 'all' || truth.part === part;
      return roc(positives.filter(isIn), clean.filter(isIn), method);
    };
    return { all: of('all'), real: of('real'), synthetic: of('synthetic') };
  };
  return {
    name: method.name,
    roc: rocOf(seen),
    rocWithWeak: rocOf(folded),
    cleanCalledFolded: shareFigure(clean, method.callsFolded),
    cleanCalledClear: shareFigure(clean, method.callsClear),
    foldedCalledFolded: shareFigure(seen, method.callsFolded),
    foldedCalledClear: shareFigure(seen, method.callsClear),
    foldedCalledClearWithWeak: shareFigure(folded, method.callsClear),
    provableCalledFolded: shareFigure(captures.filter(isProvable), method.callsFolded),
  };
}

function roc(
  folded: readonly ScreenedCapture[],
  clean: readonly ScreenedCapture[],
  method: ScreeningMethod,
): RocWithLimits {
  const ranked = byFallingScore(
    [...folded, ...clean].map((capture) => ({
      score: method.score(capture),
      isFolded: isFolded(capture),
      recording: recordingOf(capture.truth),
    })),
  );
  const clusters = ranked.map(({ recording }) => recording);
  const limits = (name: keyof RocFigures): Limits =>
    bootstrapLimits(clusters, (weights) => rocFigures(ranked, weights)[name]);
  return {
    folded: folded.length,
    clean: clean.length,
    ...rocFigures(ranked),
    limits: { area: limits('area'), foundAt2: limits('foundAt2'), foundAt5: limits('foundAt5') },
  };
}
