import { verdicts } from '../../../shared/schemas/screening.js';
import type { ScreenedCapture } from '../screening/ScreenedCapture.js';

export interface ReasonFigures {
  group: string;
  verdict: string;
  /** Captures by the kind of finding that holds them back: the gravest, the surest first. */
  kinds: { kind: string; count: number }[];
}

const rank = { fold: 0, unproven: 1, limit: 2, note: 3 } as const;

/** Why captures of a group are not called clear, by verdict. */
export function reasonFigures(group: string, captures: readonly ScreenedCapture[]): ReasonFigures[] {
  return verdicts.flatMap((verdict) => {
    const own = captures.filter((one) => one.verdict === verdict && verdict !== 'clear');
    if (own.length === 0) return [];
    const counts = new Map<string, number>();
    for (const { findings } of own) {
      const gravest = [...findings].sort(
        (a, b) => rank[a.severity] - rank[b.severity] || b.confidence - a.confidence,
      )[0];
      const kind = gravest === undefined ? 'none' : `${gravest.kind} (${gravest.severity})`;
      counts.set(kind, (counts.get(kind) ?? 0) + 1);
    }
    const kinds = [...counts].map(([kind, count]) => ({ kind, count })).sort((a, b) => b.count - a.count);
    return [{ group, verdict, kinds }];
  });
}
