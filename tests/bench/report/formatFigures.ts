import type { ShareFigure } from '../figures/shareFigure.js';
import type { Limits } from '../statistics/bootstrapLimits.js';

export function percent(share: number | null): string {
  return share === null || Number.isNaN(share) ? '–' : `${(100 * share).toFixed(1)} %`;
}

export function percentRange({ low, high }: Limits): string {
  return Number.isNaN(low) ? '–' : `${(100 * low).toFixed(1)} to ${(100 * high).toFixed(1)} %`;
}

/** "0.972 (0.961 to 0.981)" */
export function areaText(area: number, { low, high }: Limits): string {
  return Number.isNaN(area) ? '–' : `${area.toFixed(3)} (${low.toFixed(3)} to ${high.toFixed(3)})`;
}

/** "92.1 % (70 of 76; 88.0 to 96.1 %)": the limits by recordings; where these are blind (none or all), the exact ones. */
export function shareText(figure: ShareFigure): string {
  if (figure.total === 0) return '–';
  const isBlind = figure.count === 0 || figure.count === figure.total;
  return `${percent(figure.share)} (${figure.count} of ${figure.total}; ${percentRange(isBlind ? figure.exact : figure.byRecording)})`;
}

/** "0.3 % (3 of 1000; at most 0.8 %)" */
export function upperText(figure: ShareFigure): string {
  if (figure.total === 0) return '–';
  return `${percent(figure.share)} (${figure.count} of ${figure.total}; at most ${percent(figure.exactUpper)})`;
}

/** "71 of 76 (93 %)" */
export function countText(figure: ShareFigure): string {
  return figure.total === 0 ? '–' : `${figure.count} of ${figure.total} (${percent(figure.share)})`;
}
