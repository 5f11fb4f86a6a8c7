import type { BenchFigures } from '../figures/benchFigures.js';
import { isClearable } from '../figures/isClearable.js';
import { isClean, isFolded, isProvable } from '../figures/methodFigures.js';
import { statedBandwidthHz } from '../figures/raisedRateFigures.js';
import { countTones, isFoldedTone } from '../figures/toneFigures.js';
import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import type { ReportTable } from './ReportTable.js';

const headlineLength = 110;
const extremes = 15;

/** What was missed and why: one table a kind of miss, each capture with its verdict and the sentence behind it. */
export function missTables(all: readonly ScreenedCapture[], figures: BenchFigures): ReportTable[] {
  const clean = all.filter(isClean);
  const folded = all.filter(isFolded);
  const scoreOf = ({ foldScore, prior }: ScreenedCapture): number => foldScore ?? prior;
  return [
    table(
      'Not screened',
      all.filter(({ failure, truth }) => failure !== null && truth.label !== 'na'),
    ),
    table(
      'Clean called folded',
      clean.filter(({ verdict }) => verdict === 'folded'),
    ),
    table(
      'Folded called clear',
      folded.filter(({ verdict }) => verdict === 'clear'),
    ),
    table(
      'Provable, not called folded',
      all.filter((one) => isProvable(one) && one.verdict !== 'folded'),
    ),
    table(
      'Clearable, not called clear',
      clean.filter((one) => isClearable(one) && one.verdict !== 'clear'),
    ),
    table(
      'Clean, not clearable, called clear',
      clean.filter((one) => one.simple !== null && !isClearable(one) && one.verdict === 'clear'),
    ),
    table(
      'Rate raised: not limited, or bandwidth not within 5 %',
      all.filter((one) => {
        const ratio = (statedBandwidthHz(one) ?? 0) / (one.truth.trueBandwidthHz ?? 1);
        return one.truth.isRateRaised && (one.verdict !== 'limited' || Math.abs(ratio - 1) > 0.05);
      }),
      (one) => `states ${hertz(statedBandwidthHz(one))}, is ${hertz(one.truth.trueBandwidthHz)}`,
    ),
    table(
      'Clear-to claims that do not hold',
      figures.clearTo.broken.map(({ capture }) => capture),
      (one) => {
        const worst = figures.clearTo.broken.find(({ capture }) => capture === one)?.worstBandDb ?? 0;
        return `to ${hertz(one.clearToHz)}, worst band ${worst.toFixed(1)} dB`;
      },
    ),
    table(
      'Folded tones that are none',
      all.filter((one) => countTones(one).wrong > 0),
      (one) =>
        one.tones
          .filter(isFoldedTone)
          .map(({ frequencyHz, explanation }) => `${explanation} at ${hertz(frequencyHz)}`)
          .join('; '),
    ),
    table('Folded, lowest scores', [...folded].sort((a, b) => scoreOf(a) - scoreOf(b)).slice(0, extremes)),
    table('Clean, highest scores', [...clean].sort((a, b) => scoreOf(b) - scoreOf(a)).slice(0, extremes)),
  ].filter(({ rows }) => rows.length > 0);
}

function table(
  title: string,
  captures: readonly ScreenedCapture[],
  remark: (capture: ScreenedCapture) => string = () => '',
): ReportTable {
  return {
    title: `${title} (${captures.length})`,
    columns: ['file', 'made as', 'evidence', 'verdict', 'score', 'why'],
    rows: captures.map((one) => {
      const { set, file, family, operation, filter, lookalike, defects, evidence } = one.truth;
      const why = [remark(one), one.failure ?? one.headline ?? ''].filter((text) => text !== '').join(' — ');
      return [
        `${set}/${file}`,
        [family, operation, filter, lookalike, ...defects].filter((text) => text !== '').join(', '),
        evidence,
        one.verdict ?? 'failed',
        one.foldScore?.toFixed(3) ?? 'none',
        why.length > headlineLength ? `${why.slice(0, headlineLength)}…` : why,
      ];
    }),
    notes: [],
  };
}

function hertz(value: number | null): string {
  return value === null ? 'none' : `${Number(value.toPrecision(6))} Hz`;
}
