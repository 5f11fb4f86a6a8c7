import type { FindingKind } from '../../../shared/schemas/screening.js';
import type { MonteCarloFigures } from '../monteCarlo/runMonteCarlo.js';
import { clopperPearson } from '../statistics/clopperPearson.js';
import { percent, percentRange } from './formatFigures.js';
import type { ReportTable } from './ReportTable.js';

export function monteCarloTables({ tones, noise, runs }: MonteCarloFigures): ReportTable[] {
  const kinds = [...new Set(noise.flatMap((one) => Object.keys(one.kinds) as FindingKind[]))].sort();
  const share = (count: number): string =>
    `${percent(count / runs)} (${count} of ${runs}; ${percentRange(clopperPearson(count, runs))})`;
  return [
    {
      title: `Tone frequency against the Cramér-Rao bound, ${runs} runs`,
      columns: ['case', 'mean square error over the bound', '95 % interval', 'missed'],
      rows: tones.map(({ name, aboveBoundDb, lowDb, highDb, missed, tones: all }) => [
        name,
        `${aboveBoundDb.toFixed(2)} dB`,
        `${lowDb.toFixed(2)} to ${highDb.toFixed(2)} dB`,
        `${missed} of ${all}`,
      ]),
      notes: [
        'The bound of the whole model, from the inverse Fisher matrix (Kay 1993); an estimator without bias is at 0 dB at best.',
      ],
    },
    {
      title: `Clean stationary noise, ${runs} captures`,
      columns: ['what is said', ...noise.map(({ name }) => name)],
      rows: [
        ['verdict folded', ...noise.map(({ calledFolded }) => share(calledFolded))],
        ...kinds.map((kind) => [`finding ${kind}`, ...noise.map((one) => share(one.kinds[kind] ?? 0))]),
      ],
      notes: [
        'Findings that speak of folding, at the confidence asked for by default; exact 95 % limits. A kind that is not listed never came.',
      ],
    },
  ];
}
