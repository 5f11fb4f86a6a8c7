import type { AcquisitionSheet } from '../schemas/acquisitionSheet.js';
import type { Finding, FindingKind, FindingSeverity } from '../schemas/screening.js';
import type { Thresholds } from '../schemas/thresholds.js';
import { formatHz, formatPercent, formatSeconds } from './formatNumber.js';
import type { MeasurementRecord, SpanS } from './MeasurementRecord.js';

const rateTolerance = 2e-3;
const largestOffsetShare = 0.25;
const coarseStepsPerDeviation = 8;
const spansListed = 4;

/** Findings about the recording itself: what is damaged, what is missing, what limits any statement. */
export function judgeIntegrity(record: MeasurementRecord, thresholds: Thresholds, sheet: AcquisitionSheet): Finding[] {
  const findings: Finding[] = [];
  const add = (
    kind: FindingKind,
    severity: FindingSeverity,
    text: string,
    evidence: Finding['evidence'],
    extra: Partial<Finding> = {},
  ) => findings.push({ kind, severity, confidence: 1, text, evidence, method: 'count over all samples', ...extra });
  const { integrity, obstacles, durationS, samples, level } = record;

  // Stretches that could be left out stop no statement about the rest.
  const damage = (isOver: boolean): FindingSeverity => {
    if (record.damageLeftOut) return 'note';
    return isOver ? 'unproven' : 'limit';
  };
  if (record.sampleRateHz === null) {
    add(
      'rateUnknown',
      'unproven',
      'The sampling rate is not known: neither the file nor the acquisition sheet states it. Enter the rate in the acquisition sheet.',
      { samples },
    );
  }
  // Pauses are no signal: what is judged is what remains.
  const signalS = durationS === null ? null : durationS * (1 - integrity.pauseShare);
  const tooShort = signalS !== null && signalS < thresholds.minDurationS;
  if (obstacles.includes('tooFewSamples') || tooShort) {
    const length = signalS === null ? `${samples} samples` : `${formatSeconds(signalS)} of signal (${samples} samples)`;
    add(
      'tooShort',
      'unproven',
      `The capture holds only ${length}; at least ${thresholds.minDurationS > 0 ? `${formatSeconds(thresholds.minDurationS)} and ` : ''}256 samples are needed to judge its band edge.`,
      { samples, ...(durationS === null ? {} : { durationS }), minDurationS: thresholds.minDurationS },
    );
  }
  if (obstacles.includes('silent')) {
    add('silent', 'unproven', 'The channel holds one constant value: there is no signal to judge.', {
      value: level?.mean ?? 0,
    });
  }
  // Missing rows of a uniform grid are read as no numbers too; they have a finding of their own.
  const missingRows = Math.round((record.timeStamps?.missingShare ?? 0) * samples);
  const notFiniteCount = integrity.notFiniteCount - missingRows;
  if (notFiniteCount > 0) {
    const share = notFiniteCount / Math.max(1, samples);
    add(
      'notFinite',
      level === null ? 'unproven' : damage(share > thresholds.maxMissingShare),
      `${notFiniteCount} of ${samples} samples are no numbers (${formatPercent(share)}); those stretches are left out of the spectra.`,
      { notFiniteCount, share },
    );
  }
  if (integrity.clippedCount > 0) {
    const over = integrity.clippedShare > thresholds.maxClippedShare;
    add(
      'clipping',
      damage(over),
      `${integrity.clippedCount} samples are clipped (${formatPercent(integrity.clippedShare)}) in ${integrity.clippedRuns} flat tops${integrity.clipsBelowFullScale ? ', below full scale' : ''}${spansText(integrity.clippedSpans)}. Clipping after sampling makes harmonics that fold: energy near the band edge may come from it.`,
      {
        clippedCount: integrity.clippedCount,
        clippedShare: integrity.clippedShare,
        clippedRuns: integrity.clippedRuns,
        clipsBelowFullScale: integrity.clipsBelowFullScale,
        limit: thresholds.maxClippedShare,
      },
      firstSpan(integrity.clippedSpans),
    );
  }
  if (integrity.dropoutCount > 0) {
    const over = integrity.missingShare > thresholds.maxMissingShare;
    add(
      'dropout',
      damage(over),
      `${counted(integrity.dropoutCount, 'stretch holds', 'stretches hold')} one value far longer than the signal explains (${formatPercent(integrity.missingShare)} of the samples)${spansText(integrity.dropouts)}; left out of the spectra.`,
      { dropoutCount: integrity.dropoutCount, missingShare: integrity.missingShare, limit: thresholds.maxMissingShare },
      firstSpan(integrity.dropouts),
    );
  }
  if (integrity.pauseCount > 0) {
    add(
      'silent',
      'note',
      `The signal rests in ${counted(integrity.pauseCount, 'stretch', 'stretches')} (${formatPercent(integrity.pauseShare)} of the samples)${spansText(integrity.pauses)}: silence at the start or the end, or a pause into which it fades. Left out of the spectra.`,
      { pauseCount: integrity.pauseCount, pauseShare: integrity.pauseShare },
      { ...firstSpan(integrity.pauses), method: 'runs of one value, by the steps into and out of them' },
    );
  }
  if (integrity.offsetShare > largestOffsetShare && !obstacles.includes('silent')) {
    add(
      'offset',
      'note',
      `The mean is ${formatPercent(integrity.offsetShare)} of the largest value. Removing it also removes anything that folds to 0 Hz.`,
      { offsetShare: integrity.offsetShare, mean: level?.mean ?? 0 },
    );
  }
  if (
    integrity.stepsPerDeviation !== null &&
    integrity.stepsPerDeviation < coarseStepsPerDeviation &&
    !obstacles.includes('silent')
  ) {
    add(
      'coarseSteps',
      'limit',
      `The signal moves over only ${integrity.stepsPerDeviation.toPrecision(3)} quantisation steps (standard deviation): rounding makes harmonics that fold, and hides what lies below.`,
      { stepsPerDeviation: integrity.stepsPerDeviation, quantum: integrity.quantum ?? 0 },
      { method: 'common step of the values', source: 'Bennett 1948' },
    );
  }
  judgeStamps(record, thresholds, add);
  const declared = sheet.sampleRateHz;
  if (
    declared !== undefined &&
    record.headerRateHz !== null &&
    Math.abs(declared / record.headerRateHz - 1) > rateTolerance
  ) {
    add(
      'rateDisagrees',
      'unproven',
      `The acquisition sheet says ${formatHz(declared)}, the file ${formatHz(record.headerRateHz)}. All frequencies depend on which is right: correct the sheet.`,
      { declaredHz: declared, fileHz: record.headerRateHz },
      { method: 'sheet against file' },
    );
  }
  if (
    sheet.companion !== undefined &&
    record.companion === null &&
    record.warnings.every(({ code }) => code !== 'COMPANION_MISSING')
  ) {
    add(
      'companionMissing',
      'note',
      `The acquisition sheet names the companion ${sheet.companion}, but it was not at hand: tones were not compared between the two rates.`,
      { companion: sheet.companion },
      { method: 'second rate' },
    );
  }
  for (const warning of record.warnings) {
    if (warning.code.includes('TRUNCATED'))
      add('truncatedFile', 'limit', warning.message, { code: warning.code }, { method: 'file structure' });
    if (warning.code === 'COMPANION_MISSING')
      add('companionMissing', 'note', warning.message, { code: warning.code }, { method: 'second rate' });
  }
  return findings;
}

type Add = (
  kind: FindingKind,
  severity: FindingSeverity,
  text: string,
  evidence: Finding['evidence'],
  extra?: Partial<Finding>,
) => void;

function judgeStamps(
  { timeStamps, damageLeftOut, sampleRateHz }: MeasurementRecord,
  thresholds: Thresholds,
  add: Add,
): void {
  if (timeStamps === null) return;
  const { gaps, missingShare, repeatedCount, jitterShare, irregular } = timeStamps;
  if (gaps.length > 0) {
    const over = missingShare > thresholds.maxMissingShare;
    add(
      'timeStampGap',
      damageLeftOut ? 'note' : over ? 'unproven' : 'limit',
      `Rows are missing at ${gaps.length} places (${formatPercent(missingShare)} of the grid)${spansText(gaps)}.`,
      { gaps: gaps.length, missingShare, limit: thresholds.maxMissingShare },
      { ...firstSpan(gaps), method: 'time stamps against a uniform grid' },
    );
  }
  if (repeatedCount > 0) {
    add(
      'timeStampRepeated',
      'note',
      `${repeatedCount} time stamps are repeated: the stamps are written more coarsely than the samples were taken.`,
      { repeatedCount, roundingStepS: timeStamps.roundingStepS },
      { method: 'time stamps against a uniform grid' },
    );
  }
  if (!irregular && jitterShare > thresholds.maxJitterShare) {
    // Stamps written with few digits scatter by their rounding; the samples were taken on the grid all the same.
    const roundedShare = (timeStamps.roundingStepS * (sampleRateHz ?? 0)) / Math.sqrt(12);
    const isRounding = jitterShare <= 1.2 * roundedShare;
    add(
      'timeStampJitter',
      isRounding ? 'note' : 'limit',
      `The time stamps scatter by ${formatPercent(jitterShare)} of the sampling interval about a uniform grid${isRounding ? ', which the rounding of the written stamps explains' : ''}.`,
      { jitterShare, limit: thresholds.maxJitterShare },
      { method: 'time stamps against a uniform grid' },
    );
  }
}

const counted = (count: number, one: string, many: string): string => `${count} ${count === 1 ? one : many}`;

function spansText(spans: SpanS[]): string {
  if (spans.length === 0) return '';
  const ordered = [...spans].sort((a, b) => a.fromS - b.fromS);
  const listed = ordered
    .slice(0, spansListed)
    .map(({ fromS, toS }) => `${formatSeconds(fromS)} to ${formatSeconds(toS)}`);
  return `, ${ordered.length > spansListed ? 'among others ' : ''}at ${listed.join(', ')}`;
}

function firstSpan(spans: SpanS[]): Partial<Finding> {
  const first = [...spans].sort((a, b) => a.fromS - b.fromS)[0];
  return first === undefined ? {} : { fromS: first.fromS, toS: first.toS };
}
