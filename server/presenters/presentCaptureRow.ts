import type { CaptureRow, FailureDto } from '../../shared/schemas/capture.js';
import type { DecisionDto } from '../../shared/schemas/decision.js';
import type { CaptureListRow } from '../repositories/captureRepository.js';

function presentFailure(row: CaptureListRow): FailureDto | null {
  if (row.state !== 'failed' || row.failureCode === null) return null;
  return {
    code: row.failureCode,
    message: row.failureMessage ?? '',
    ...(row.failureLine === null ? {} : { line: row.failureLine }),
  };
}

function presentDecisionInForce(row: CaptureListRow): DecisionDto | null {
  if (!row.decisionId || !row.decision || !row.decidedById || !row.decidedAt) return null;
  return {
    id: row.decisionId,
    decision: row.decision,
    limitHz: row.limitHz,
    reason: row.reason ?? '',
    decidedBy: { id: row.decidedById, name: row.decidedByName ?? '' },
    decidedAt: row.decidedAt.toISOString(),
    version: row.decisionVersion,
  };
}

export function presentCaptureRow(row: CaptureListRow): CaptureRow {
  return {
    id: row.id,
    batchId: row.batchId,
    batchName: row.batchName,
    projectId: row.projectId,
    projectName: row.projectName,
    fileName: row.fileName,
    format: row.format,
    sizeBytes: Number(row.sizeBytes),
    sha256: row.sha256,
    state: row.state,
    progress: row.progress,
    verdict: row.verdict,
    foldScore: row.foldScore,
    clearToHz: row.clearToHz,
    sampleRateHz: row.sampleRateHz,
    durationS: row.durationS,
    channelCount: row.channelCount,
    logger: row.logger,
    position: row.position,
    headline: row.headline,
    failure: presentFailure(row),
    decision: presentDecisionInForce(row),
    duplicateOfId: row.duplicateOfId,
    uploadedBy: row.uploadedById && row.uploadedByName ? { id: row.uploadedById, name: row.uploadedByName } : null,
    createdAt: row.createdAt.toISOString(),
    screenedAt: row.screenedAt?.toISOString() ?? null,
  };
}
