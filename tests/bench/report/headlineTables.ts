import type { BenchFigures } from '../figures/benchFigures.js';
import { type MethodFigures, parts } from '../figures/methodFigures.js';
import type { Calibration } from '../statistics/calibrationAtShare.js';
import { areaText, percent, percentRange, shareText, upperText } from './formatFigures.js';
import type { ReportTable } from './ReportTable.js';

/** The figures that the screening stands or falls by; the simple methods on the same captures side by side. */
export function methodTable({ methods }: BenchFigures): ReportTable {
  const row = (name: string, target: string, cell: (method: MethodFigures) => string): string[] => [
    name,
    target,
    ...methods.map(cell),
  ];
  const areaTargets = { all: '≥ 0.95', real: '≥ 0.96', synthetic: '≥ 0.92' };
  return {
    title: 'Headline, side by side with two simple methods',
    columns: ['figure', 'target', ...methods.map(({ name }) => name)],
    rows: [
      ...parts.map((part) =>
        row(`area under ROC, ${part}`, areaTargets[part], ({ roc }) => areaText(roc[part].area, roc[part].limits.area)),
      ),
      ...parts.flatMap((part) => [
        row(`found at 2 % false alarms, ${part}`, part === 'all' ? '≥ 80 %' : '', ({ roc }) =>
          foundText(roc[part].foundAt2, roc[part].limits.foundAt2),
        ),
        row(`found at 5 % false alarms, ${part}`, '', ({ roc }) =>
          foundText(roc[part].foundAt5, roc[part].limits.foundAt5),
        ),
      ]),
      row('area under ROC, all, "weak" included', '', ({ rocWithWeak }) =>
        areaText(rocWithWeak.all.area, rocWithWeak.all.limits.area),
      ),
      row('found at 2 % false alarms, all, "weak" included', '', ({ rocWithWeak }) =>
        foundText(rocWithWeak.all.foundAt2, rocWithWeak.all.limits.foundAt2),
      ),
      row('clean called folded', 'at most ≤ 1 %', (one) => upperText(one.cleanCalledFolded)),
      row('folded called clear', '≤ 2 %', (one) => upperText(one.foldedCalledClear)),
      row('folded called clear, "weak" included', '', (one) => upperText(one.foldedCalledClearWithWeak)),
      row('called folded where provable', '≥ 85 %', (one) => shareText(one.provableCalledFolded)),
      row('folded called folded', '', (one) => shareText(one.foldedCalledFolded)),
      row('clean called clear', '', (one) => shareText(one.cleanCalledClear)),
    ],
    notes: [
      'Grey captures and those about which nothing can be said are left out; so are folded ones that show nothing ("weak"), unless said.',
      'In brackets: 95 % limits by drawing whole recordings with replacement (1000 times); "at most": upper 95 % limit after Clopper & Pearson.',
      'Captures with irregular stamps are beyond the simple methods: the second column is this engine on what they can be used on.',
    ],
  };
}

/** Everything that only this engine states. */
export function engineTable(figures: BenchFigures): ReportTable {
  const { clearTo, raisedRate, tones } = figures;
  const all = tones.find(({ group }) => group === 'all')?.figures;
  const trueRule = clearTo.shareOfTrueRule;
  return {
    title: 'What else is stated',
    columns: ['figure', 'target', 'Overfold'],
    rows: [
      ['clearable clean captures called clear', '≥ 90 %', shareText(figures.clearable)],
      ['… of these, undamaged ones', '', shareText(figures.clearableUndamaged)],
      ['other clean captures limited or unproven', '≥ 95 %', shareText(figures.otherCleanHeldBack)],
      ['nothing to say (na): unproven or refused', '', shareText(figures.naUnproven)],
      ['rate raised: called limited', '≥ 90 %', shareText(raisedRate.calledLimited)],
      ['rate raised: true bandwidth within 5 %', '', shareText(raisedRate.bandwidthRight)],
      ['rate raised: limited and bandwidth within 5 %', '≥ 90 %', shareText(raisedRate.both)],
      ['visible folded tones found', '≥ 80 %', all ? shareText(all.found) : '–'],
      ['true frequency of the found ones right', '≥ 95 %', all ? shareText(all.trueRight) : '–'],
      ['folded tones reported that are none', '', all ? shareText(all.wrong) : '–'],
      ['clear-to claims that hold', '≥ 99 % of ≥ 300', shareText(clearTo.holds)],
      ['… of claims over at least a tenth of the band', '', shareText(clearTo.holdsWhereTestable)],
      [
        'clear-to over what the same rule gives on true densities, median',
        '≥ 0.90',
        trueRule === null
          ? '–'
          : `${trueRule.median.toFixed(3)} (lower quartile ${trueRule.lowerQuartile.toFixed(3)}, ${trueRule.captures} captures)`,
      ],
      ['clear-to over fs/2 on clean captures, median', '', percent(clearTo.medianShareOfBand)],
      ...figures.calibration.flatMap(({ population, atShares }) =>
        atShares.map((one) => [
          `calibration error at ${percent(one.share)} folded: ${population}`,
          '≤ 0.03',
          calibrationText(one),
        ]),
      ),
    ],
    notes: [
      'Clearable: the density next to fs/2, spread over the band, is 43 dB or more under the total power, and the rate was not raised.',
      'A claim holds when each whole tenth of the band below it is folded into by less than the protection.',
      'Calibration error: 10 bins of equal count, less what a perfect score shows by chance on as many captures.',
    ],
  };
}

function foundText(share: number, limits: { low: number; high: number }): string {
  return Number.isNaN(share) ? '–' : `${percent(share)} (${percentRange(limits)})`;
}

function calibrationText({ correctedError, error, expectedError, captures }: Calibration): string {
  if (captures === 0 || Number.isNaN(error)) return '–';
  return `${correctedError.toFixed(3)} (${error.toFixed(3)} less ${expectedError.toFixed(3)}; n = ${captures})`;
}
