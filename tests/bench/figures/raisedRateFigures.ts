import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { type ShareFigure, shareFigure } from './shareFigure.js';

const tolerance = 0.05;

export interface RaisedRateFigures {
  calledLimited: ShareFigure;
  bandwidthRight: ShareFigure;
  both: ShareFigure;
}

/** Captures whose rate was raised after recording: told as such, and how much band they really hold. */
export function raisedRateFigures(captures: readonly ScreenedCapture[]): RaisedRateFigures {
  const raised = captures.filter(({ truth }) => truth.isRateRaised);
  const isLimited = ({ verdict }: ScreenedCapture): boolean => verdict === 'limited';
  return {
    calledLimited: shareFigure(raised, isLimited),
    bandwidthRight: shareFigure(raised, hasBandwidthRight),
    both: shareFigure(raised, (one) => isLimited(one) && hasBandwidthRight(one)),
  };
}

/** The bandwidth that the findings state: of the raised rate first, of over-sampling otherwise. */
export function statedBandwidthHz({ findings }: ScreenedCapture): number | null {
  for (const kind of ['rateRaised', 'overSampled']) {
    for (const finding of findings) {
      const stated = finding.evidence['trueBandwidthHz'];
      if (finding.kind === kind && typeof stated === 'number') return stated;
    }
  }
  return null;
}

function hasBandwidthRight(capture: ScreenedCapture): boolean {
  const [stated, truth] = [statedBandwidthHz(capture), capture.truth.trueBandwidthHz];
  return stated !== null && truth !== null && Math.abs(stated / truth - 1) <= tolerance;
}
