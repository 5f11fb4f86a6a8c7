import type { FigureRole } from '@/help/figures/HelpFigure';

/** The theme colour of each part of a figure. */
export const roleColors: Record<FigureRole, string> = {
  signal: 'primary',
  folded: 'folded',
  caution: 'caution',
  protected: 'protected',
  quiet: 'secondary',
};
