import type { CaptureDto, CompanionDto } from '../../shared/schemas/capture.js';
import type { CaptureDetail } from '../services/CaptureService.js';
import { presentCaptureRow } from './presentCaptureRow.js';
import { presentDecision } from './presentDecision.js';

function presentCompanion(row: CaptureDetail['row']): CompanionDto | null {
  if (row.state !== 'screened' || row.companionId === null) return null;
  return {
    id: row.companionId,
    fileName: row.companionFileName ?? '',
    sampleRateHz: row.companionRateHz,
    isCompared: row.companionNote === null,
  };
}

export function presentCapture(detail: CaptureDetail): CaptureDto {
  const { row, screens, decisions, history, decideRefusal, editRefusal } = detail;
  return {
    ...presentCaptureRow(row),
    channels: screens,
    acquisition: { ...row.batchAcquisition, ...row.acquisition },
    acquisitionOverride: row.acquisition,
    csvLayout: row.csvLayout,
    companion: presentCompanion(row),
    companionNote: row.state === 'screened' ? row.companionNote : null,
    thresholdsVersion: row.thresholdsVersion,
    guardStart: row.guardStart,
    engineVersion: row.engineVersion,
    decisions: decisions.map(presentDecision),
    decisionVersion: row.decisionVersion,
    history: history.map((entry) => ({
      at: entry.createdAt.toISOString(),
      actorName: entry.actorName,
      action: entry.action,
      text: entry.text,
    })),
    permissions: {
      decide: decideRefusal === null,
      edit: editRefusal === null,
      decideRefusal: decideRefusal?.message ?? null,
    },
  };
}
