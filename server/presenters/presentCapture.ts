import type { CaptureDto } from '../../shared/schemas/capture.js';
import type { CaptureDetail } from '../services/CaptureService.js';
import { presentCaptureRow } from './presentCaptureRow.js';
import { presentDecision } from './presentDecision.js';

export function presentCapture(detail: CaptureDetail): CaptureDto {
  const { row, capture, screens, decisions, history, decideRefusal, editRefusal } = detail;
  return {
    ...presentCaptureRow(row),
    channels: screens,
    acquisition: { ...capture.batch.acquisition, ...capture.acquisition },
    acquisitionOverride: capture.acquisition,
    csvLayout: capture.csvLayout,
    thresholdsVersion: capture.thresholdsVersion,
    guardStart: detail.guardStart,
    engineVersion: capture.engineVersion,
    decisions: decisions.map(presentDecision),
    decisionVersion: capture.decisionVersion,
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
