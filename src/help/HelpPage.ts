import type { FindingKind } from '@shared/schemas/screening.js';
import type { HelpFigureName } from './figures/helpFigures';

/** A published source, found by its authors and year. */
export interface HelpSource {
  authors: string;
  year: number;
  about: string;
}

/** One finding kind, explained to whoever has to act on it. */
export interface HelpPage {
  kind: FindingKind;
  meaning: string;
  /** Written for `formulaParts`: `f_{s}` and `10^{x}` lower and raise what stands in braces. */
  formulas: string[];
  /** What the letters of the formulas stand for. */
  letters: string;
  measured: string;
  actions: { analyst: string; reviewer: string };
  limits: string;
  /** Empty where the finding is a count or a comparison that needs no source. */
  sources: HelpSource[];
  figure: HelpFigureName;
}
