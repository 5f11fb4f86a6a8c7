import type { HelpFigure } from './HelpFigure';
import {
  boundFigure,
  floorFigure,
  foldedShareFigure,
  overSampledFigure,
  resonanceFigure,
  skirtFigure,
} from './edgeFigures';
import {
  ambiguousFigure,
  clippingHarmonicsFigure,
  foldedToneFigure,
  mirrorFigure,
  rateScaleFigure,
  twoChannelsFigure,
  twoRatesFigure,
} from './spectrumFigures';
import {
  clippedFigure,
  coarseStepsFigure,
  cutShortFigure,
  dropoutFigure,
  edgeOverTimeFigure,
  irregularFigure,
  offsetFigure,
  reflectedSweepFigure,
  silentFigure,
  sourceAtFoldFigure,
  timeStampFigure,
  triangleFigure,
  wrappedOrderFigure,
} from './timeFigures';

/** Every figure of the help, drawn from synthetic data each time it is asked for, and always the same. */
export const helpFigures = {
  foldedTone: foldedToneFigure,
  ambiguous: ambiguousFigure,
  clippingHarmonics: clippingHarmonicsFigure,
  mirror: mirrorFigure,
  twoRates: twoRatesFigure,
  twoChannels: twoChannelsFigure,
  rateScale: rateScaleFigure,
  skirt: skirtFigure,
  bound: boundFigure,
  floor: floorFigure,
  overSampled: overSampledFigure,
  resonance: resonanceFigure,
  foldedShare: foldedShareFigure,
  edgeOverTime: edgeOverTimeFigure,
  clipped: clippedFigure,
  dropout: dropoutFigure,
  cutShort: cutShortFigure,
  offset: offsetFigure,
  coarseSteps: coarseStepsFigure,
  silent: silentFigure,
  timeStamps: timeStampFigure,
  irregular: irregularFigure,
  wrappedOrder: wrappedOrderFigure,
  reflectedSweep: reflectedSweepFigure,
  sourceAtFold: sourceAtFoldFigure,
  triangle: triangleFigure,
} as const satisfies Record<string, () => HelpFigure>;

export type HelpFigureName = keyof typeof helpFigures;
