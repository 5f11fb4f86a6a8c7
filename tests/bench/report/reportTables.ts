import type { BenchFigures } from '../figures/benchFigures.js';
import { evidenceTable, groupTables, reasonTable, reliabilityTable, toneTable } from './detailTables.js';
import { engineTable, methodTable } from './headlineTables.js';
import type { ReportTable } from './ReportTable.js';

/** The whole report but the misses. */
export function reportTables(figures: BenchFigures): ReportTable[] {
  const { captures } = figures;
  return [
    {
      title: 'What was screened',
      columns: ['what', 'count'],
      rows: [
        ['sets', `${figures.sets.length}: ${figures.sets.join(', ')}`],
        ['captures', String(captures.all)],
        ['folded, grey, clean', `${captures.folded}, ${captures.grey}, ${captures.clean}`],
        ['nothing can be said (na)', String(captures.na)],
        ['recordings or events', String(figures.recordings)],
        ['not screened (a fault, or refused)', String(captures.failed)],
        ['folded or clean, without a score', String(captures.withoutScore)],
        ['engine', `${figures.engineVersion}, ${figures.medianElapsedMs.toFixed(0)} ms a capture (median)`],
      ],
      notes: [],
    },
    methodTable(figures),
    engineTable(figures),
    evidenceTable(figures),
    toneTable(figures),
    reasonTable(figures),
    reliabilityTable(figures),
    ...groupTables(figures),
  ];
}
