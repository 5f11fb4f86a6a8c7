import { engineVersion } from '../../../shared/constants/engineVersion.js';
import type { ScreenedCapture } from '../screening/ScreenedCapture.js';
import { recordingOf } from '../sets/LabelledCapture.js';
import { type CalibrationFigures, calibrationFigures } from './calibrationFigures.js';
import { type ClearToFigures, clearToFigures } from './clearToFigures.js';
import { type GroupFigures, groupFigures } from './groupFigures.js';
import { isClearable } from './isClearable.js';
import { isClean, isFolded, type MethodFigures, methodFigures } from './methodFigures.js';
import { type RaisedRateFigures, raisedRateFigures } from './raisedRateFigures.js';
import { type ReasonFigures, reasonFigures } from './reasonFigures.js';
import { screeningMethods } from './screeningMethods.js';
import { type ShareFigure, shareFigure } from './shareFigure.js';
import { type ToneFigures, toneFigures } from './toneFigures.js';

export interface BenchFigures {
  engineVersion: string;
  sets: string[];
  captures: Record<'all' | 'folded' | 'grey' | 'clean' | 'na' | 'failed' | 'withoutScore', number>;
  recordings: number;
  medianElapsedMs: number;
  methods: MethodFigures[];
  /** Share of the folded ones called folded, by what there is to see. */
  evidence: { evidence: string; calledFolded: ShareFigure; calledClear: ShareFigure }[];
  clearable: ShareFigure;
  clearableUndamaged: ShareFigure;
  /** Clean, not clearable, uniform: limited or unproven. */
  otherCleanHeldBack: ShareFigure;
  /** Nothing can be said: `unproven` is the right answer. */
  naUnproven: ShareFigure;
  /** Why clean captures are not called clear. */
  reasons: ReasonFigures[];
  raisedRate: RaisedRateFigures;
  tones: { group: string; figures: ToneFigures }[];
  clearTo: ClearToFigures;
  calibration: CalibrationFigures[];
  families: GroupFigures[];
  lookalikes: GroupFigures[];
  defects: GroupFigures[];
  operations: GroupFigures[];
}

/** All figures of one run; pure. */
export function benchFigures(all: readonly ScreenedCapture[]): BenchFigures {
  const withLabel = (label: string): ScreenedCapture[] => all.filter(({ truth }) => truth.label === label);
  const folded = all.filter(isFolded);
  const clean = all.filter(isClean);
  const clearable = clean.filter(isClearable);
  const others = clean.filter((one) => one.simple !== null && !isClearable(one));
  const isClear = ({ verdict }: ScreenedCapture): boolean => verdict === 'clear';
  const evidences = [...new Set(folded.map(({ truth }) => truth.evidence))].sort();
  const elapsed = all.map(({ elapsedMs }) => elapsedMs).sort((a, b) => a - b);
  return {
    engineVersion,
    sets: [...new Set(all.map(({ truth }) => truth.set))],
    captures: {
      all: all.length,
      folded: folded.length,
      grey: withLabel('grey').length,
      clean: clean.length,
      na: withLabel('na').length,
      failed: all.filter(({ failure }) => failure !== null).length,
      withoutScore: [...folded, ...clean].filter(({ foldScore }) => foldScore === null).length,
    },
    recordings: new Set(all.map(({ truth }) => recordingOf(truth))).size,
    medianElapsedMs: elapsed[elapsed.length >> 1] ?? 0,
    methods: screeningMethods.map((method) => methodFigures(all, method)),
    evidence: evidences.map((evidence) => {
      const own = folded.filter(({ truth }) => truth.evidence === evidence);
      return {
        evidence,
        calledFolded: shareFigure(own, ({ verdict }) => verdict === 'folded'),
        calledClear: shareFigure(own, isClear),
      };
    }),
    clearable: shareFigure(clearable, isClear),
    clearableUndamaged: shareFigure(
      clearable.filter(({ truth }) => truth.defects.length === 0),
      isClear,
    ),
    otherCleanHeldBack: shareFigure(others, ({ verdict }) => verdict === 'limited' || verdict === 'unproven'),
    naUnproven: shareFigure(withLabel('na'), ({ verdict, failure }) => verdict === 'unproven' || failure !== null),
    reasons: [...reasonFigures('clearable', clearable), ...reasonFigures('not clearable', others)],
    raisedRate: raisedRateFigures(all),
    tones: toneGroups(all),
    clearTo: clearToFigures(all.filter(({ truth }) => truth.label !== 'na')),
    calibration: calibrationFigures(all),
    families: groupFigures(all, ({ truth }) => [truth.family]),
    lookalikes: groupFigures(all, ({ truth }) => [truth.lookalike]),
    defects: groupFigures(all, ({ truth }) => truth.defects),
    operations: groupFigures(all, ({ truth }) => (truth.part === 'real' ? [`${truth.operation}`] : [])),
  };
}

function toneGroups(all: readonly ScreenedCapture[]): BenchFigures['tones'] {
  const of = (group: string, isIn: (capture: ScreenedCapture) => boolean): BenchFigures['tones'][number] => ({
    group,
    figures: toneFigures(all.filter(isIn)),
  });
  const families = [...new Set(all.map(({ truth }) => truth.family))].sort();
  return [
    of('all', () => true),
    of('real', ({ truth }) => truth.part === 'real'),
    of('synthetic', ({ truth }) => truth.part === 'synthetic'),
    ...families.map((family) => of(`family ${family}`, ({ truth }) => truth.family === family)),
  ].filter(({ figures }) => figures.found.total > 0 || figures.wrong.total > 0);
}
