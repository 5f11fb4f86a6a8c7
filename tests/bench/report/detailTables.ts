import { verdicts } from '../../../shared/schemas/screening.js';
import type { BenchFigures } from '../figures/benchFigures.js';
import type { GroupFigures } from '../figures/groupFigures.js';
import { countText, percent, shareText } from './formatFigures.js';
import type { ReportTable } from './ReportTable.js';

export function evidenceTable({ evidence }: BenchFigures): ReportTable {
  return {
    title: 'Folded captures by what there is to see',
    columns: ['evidence', 'called folded', 'called clear'],
    rows: evidence.map((one) => [one.evidence, shareText(one.calledFolded), countText(one.calledClear)]),
    notes: ['Provable: tone, moving_mirror, pair, irregular.'],
  };
}

export function toneTable({ tones }: BenchFigures): ReportTable {
  return {
    title: 'Folded tones',
    columns: [
      'captures',
      'visible ones found',
      'true frequency right',
      'wrongly reported',
      'captures with a wrong one',
    ],
    rows: tones.map(({ group, figures }) => [
      group,
      countText(figures.found),
      countText(figures.trueRight),
      `${countText(figures.wrong)}${figures.unjudged > 0 ? `, ${figures.unjudged} can't be judged` : ''}`,
      String(figures.capturesWithWrong),
    ]),
    notes: [
      'Uniform captures. Not to be judged: reported on folded captures whose list of true tones is cut off or moving.',
    ],
  };
}

export function reasonTable({ reasons }: BenchFigures): ReportTable {
  return {
    title: 'Why clean captures are not called clear',
    columns: ['clean captures', 'verdict', 'gravest finding'],
    rows: reasons.map(({ group, verdict, kinds }) => [
      group,
      verdict,
      kinds.map(({ kind, count }) => `${count} ${kind}`).join(', '),
    ]),
    notes: [],
  };
}

export function reliabilityTable({ calibration }: BenchFigures): ReportTable {
  return {
    title: 'Fold score: stated against seen, half of the captures folded',
    columns: ['captures taken', ...Array.from({ length: 10 }, (_, bin) => `tenth ${bin + 1}`)],
    rows: calibration.map(({ population, bins }) => [
      population,
      ...bins.map(({ stated, seen }) => `${percent(stated)}: ${percent(seen)}`),
    ]),
    notes: ['Tenths of equal count by rising score: mean score, then the share that is folded.'],
  };
}

export function groupTables(figures: BenchFigures): ReportTable[] {
  return [
    groupTable('Families', 'family', figures.families),
    groupTable('Real recordings by operation', 'operation', figures.operations),
    groupTable('Look-alikes', 'look-alike', figures.lookalikes),
    groupTable('Damage', 'defect', figures.defects),
  ].filter(({ rows }) => rows.length > 0);
}

function groupTable(title: string, name: string, groups: readonly GroupFigures[]): ReportTable {
  return {
    title,
    columns: [name, 'folded: verdicts', 'clean: verdicts', 'grey: verdicts', 'area under ROC'],
    rows: groups.map(({ group, folded, clean, grey, area }) => [
      group,
      verdictText(folded),
      verdictText(clean),
      verdictText(grey),
      Number.isNaN(area) ? '–' : area.toFixed(3),
    ]),
    notes: [],
  };
}

/** "12: 9 folded, 3 unproven" */
function verdictText(counts: Record<string, number>): string {
  const total = counts['total'] ?? 0;
  if (total === 0) return '–';
  const seen = [...verdicts, 'failed'].filter((verdict) => (counts[verdict] ?? 0) > 0);
  return `${total}: ${seen.map((verdict) => `${counts[verdict]} ${verdict}`).join(', ')}`;
}
