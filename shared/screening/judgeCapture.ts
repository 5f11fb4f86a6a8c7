import { type ChannelJudgement, type Verdict, verdicts } from '../schemas/screening.js';

export interface CaptureJudgement {
  verdict: Verdict;
  foldScore: number | null;
  clearToHz: number | null;
  headline: string | null;
}

const severityRank = { fold: 0, unproven: 1, limit: 2, note: 3 } as const;

/**
 * A capture is as good as its worst channel: gravest verdict, highest fold score, lowest clear-to frequency
 * (null as soon as one channel has none), and the sentence of the gravest finding of the gravest channel.
 */
export function judgeCapture(channels: ChannelJudgement[]): CaptureJudgement {
  const gravest = [...channels].sort((a, b) => verdicts.indexOf(a.verdict) - verdicts.indexOf(b.verdict))[0];
  if (gravest === undefined) return { verdict: 'unproven', foldScore: null, clearToHz: null, headline: null };
  const scores = channels.map((channel) => channel.foldScore).filter((score) => score !== null);
  const clearTo = channels.map((channel) => channel.clearToHz);
  const headline = [...gravest.findings].sort(
    (a, b) => severityRank[a.severity] - severityRank[b.severity] || b.confidence - a.confidence,
  )[0];
  return {
    verdict: gravest.verdict,
    foldScore: scores.length === 0 ? null : Math.max(...scores),
    clearToHz: clearTo.includes(null) ? null : Math.min(...clearTo.filter((value) => value !== null)),
    headline: headline?.text ?? null,
  };
}
