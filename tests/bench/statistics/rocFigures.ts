/** A score with its truth; `recording` is the unit of resampling: captures of one recording are no independent trials. */
export interface ScoredCapture {
  score: number;
  isFolded: boolean;
  recording: string;
}

export interface RocFigures {
  /** Chance that a folded capture scores above one that is not, ties counting half. */
  area: number;
  /** Share of the folded ones above the threshold that lets at most 2 % (5 %) of the others through. */
  foundAt2: number;
  foundAt5: number;
}

/**
 * Area under the ROC curve and shares found, in one walk from the highest score down.
 * The area equals the Mann-Whitney statistic over the number of pairs (Hanley & McNeil 1982, Radiology 143, 29-36).
 * @param ranked sorted by falling score
 * @param weights how often each counts (bootstrap); 1 each when left out
 * @returns NaN where one of the two kinds is missing
 */
export function rocFigures(ranked: readonly ScoredCapture[], weights?: Float64Array): RocFigures {
  const weightOf = (index: number): number => weights?.[index] ?? 1;
  let [folded, other] = [0, 0];
  ranked.forEach(({ isFolded }, index) => {
    if (isFolded) folded += weightOf(index);
    else other += weightOf(index);
  });
  let [area, foldedAbove, otherAbove, foundAt2, foundAt5] = [0, 0, 0, 0, 0];
  for (let from = 0; from < ranked.length;) {
    let [foldedTied, otherTied] = [0, 0];
    let to = from;
    for (; to < ranked.length && ranked[to]?.score === ranked[from]?.score; to++) {
      if (ranked[to]?.isFolded) foldedTied += weightOf(to);
      else otherTied += weightOf(to);
    }
    area += otherTied * (foldedAbove + foldedTied / 2);
    foldedAbove += foldedTied;
    otherAbove += otherTied;
    if (otherAbove <= 0.02 * other) foundAt2 = foldedAbove;
    if (otherAbove <= 0.05 * other) foundAt5 = foldedAbove;
    from = to;
  }
  if (folded === 0 || other === 0) return { area: Number.NaN, foundAt2: Number.NaN, foundAt5: Number.NaN };
  return { area: area / (folded * other), foundAt2: foundAt2 / folded, foundAt5: foundAt5 / folded };
}

export function byFallingScore(scored: readonly ScoredCapture[]): ScoredCapture[] {
  return [...scored].sort((a, b) => b.score - a.score);
}
