import type { CaptureDto } from '../../shared/schemas/capture.js';
import type { CaptureDetail } from '../services/CaptureService.js';
import { presentCaptureRow } from './presentCaptureRow.js';
import { presentDecision } from './presentDecision.js';

export function presentCapture(detail: CaptureDetail): CaptureDto {
  const { row, screens, decisions, history, decideRefusal, editRefusal } = detail;
  return {
    ...presentCaptureRow(row),
    channels: screens,
    acquisition: { ...row.batchAcquisition, ...row.acquisition },
    acquisitionOverride: row.acquisition,
    csvLayout: row.csvLayout,
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
