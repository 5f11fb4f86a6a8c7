import { verdicts } from '../../../shared/schemas/screening.js';
import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { byFallingScore, rocFigures } from '../statistics/rocFigures.js';
import { isClean, isFolded } from './methodFigures.js';

export interface GroupFigures {
  group: string;
  /** Captures by label and verdict; `failed`: not screened. */
  folded: Record<string, number>;
  clean: Record<string, number>;
  grey: Record<string, number>;
  /** NaN unless it holds folded and clean ones. */
  area: number;
}

/** Verdicts by label of each group; a capture may be in several (defects) or in none (''). */
export function groupFigures(
  captures: readonly ScreenedCapture[],
  groupsOf: (capture: ScreenedCapture) => string[],
): GroupFigures[] {
  const groups = [...new Set(captures.flatMap(groupsOf))].filter((group) => group !== '').sort();
  return groups.map((group) => {
    const own = captures.filter((capture) => groupsOf(capture).includes(group));
    const judged = own.filter((one) => isFolded(one) || isClean(one));
    const ranked = byFallingScore(
      judged.map((one) => ({ score: one.foldScore ?? one.prior, isFolded: isFolded(one), recording: '' })),
    );
    return {
      group,
      folded: byVerdict(own.filter(isFolded)),
      clean: byVerdict(own.filter(isClean)),
      grey: byVerdict(own.filter(({ truth }) => truth.label === 'grey')),
      area: rocFigures(ranked).area,
    };
  });
}

function byVerdict(captures: readonly ScreenedCapture[]): Record<string, number> {
  const counts: Record<string, number> = { total: captures.length };
  for (const verdict of verdicts) counts[verdict] = captures.filter((one) => one.verdict === verdict).length;
  counts['failed'] = captures.filter(({ verdict }) => verdict === null).length;
  return counts;
}
