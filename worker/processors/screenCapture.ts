import type { DataSource } from 'typeorm';
import { UnrecoverableError } from 'bullmq';
import { engineVersion } from '../../shared/constants/engineVersion.js';
import type { ScreenCapturePayload } from '../../shared/jobs/screenCapture.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import { Batch, Capture, ThresholdsVersion } from '../../server/entities/index.js';
import { finishBatch } from '../../server/queues/finishBatch.js';
import { screenPairsElsewhere } from '../../server/queues/screenPairsElsewhere.js';
import { failCapture } from '../../server/repositories/failCapture.js';
import { saveScreening } from '../../server/repositories/saveScreening.js';
import type { WorkerContext } from '../WorkerContext.js';
import { fileLabel } from './fileLabel.js';
import { findJobCompanion } from './findJobCompanion.js';
import { runWithCompanion } from './runWithCompanion.js';

const progressPauseMs = 700;

/** Takes the capture, unless a newer attempt or another end has overtaken this job. */
async function claim(dataSource: DataSource, { captureId, attempt }: ScreenCapturePayload): Promise<Capture | null> {
  const claimed = await dataSource
    .createQueryBuilder()
    .update(Capture)
    .set({ state: 'screening', startedAt: () => 'now()', progress: 0 })
    .where('id = :captureId AND attempt = :attempt AND state IN (:...open)', {
      captureId,
      attempt,
      open: ['queued', 'screening'],
    })
    .execute();
  return claimed.affected === 1 ? dataSource.getRepository(Capture).findOneBy({ id: captureId }) : null;
}

/** Keeps the row's progress fresh without writing more than about once a second. */
function progressWriter(dataSource: DataSource, { captureId, attempt }: ScreenCapturePayload): (share: number) => void {
  let nextAtMs = 0;
  return (share) => {
    const nowMs = Date.now();
    if (nowMs < nextAtMs) return;
    nextAtMs = nowMs + progressPauseMs;
    // Only a display value: a lost write is made good by the next one, or by the result.
    void dataSource
      .getRepository(Capture)
      .update({ id: captureId, attempt, state: 'screening' }, { progress: share })
      .catch(() => undefined);
  };
}

/** What a capture's end may mean for others: their companion, or the last one of their batch. */
async function settleOthers({ dataSource, config }: WorkerContext, capture: Capture): Promise<void> {
  await screenPairsElsewhere(dataSource, [capture.id]);
  await finishBatch(dataSource, config, capture.batchId);
}

/**
 * Screens one capture: file, and its companion's if there is one -> measurement -> judgement -> rows, in one transaction.
 * Running it twice gives the same rows; a job overtaken by a newer attempt writes nothing.
 * @throws UnrecoverableError for a bad file (stored on the capture, never retried); any other error is a passing fault.
 */
export async function screenCapture(
  payload: ScreenCapturePayload,
  context: WorkerContext,
  signal: AbortSignal,
): Promise<void> {
  const { dataSource, screeningPool, config, logger } = context;
  const capture = await claim(dataSource, payload);
  if (!capture) {
    logger.info({ ...payload }, 'job overtaken, nothing to do');
    return;
  }
  const batch = await dataSource.getRepository(Batch).findOneByOrFail({ id: capture.batchId });
  const thresholdsVersion = await dataSource
    .getRepository(ThresholdsVersion)
    .findOne({ where: { projectId: capture.projectId }, order: { version: 'DESC' } });

  const chosen = await findJobCompanion(dataSource, batch, capture);
  const result = await runWithCompanion(context, capture, chosen.file, signal, (filePath, companion) =>
    screeningPool.run(
      {
        filePath,
        fileName: fileLabel(capture.fileName),
        sha256: capture.sha256,
        sizeBytes: capture.sizeBytes,
        acquisition: { ...batch.acquisition, ...capture.acquisition },
        csvLayout: capture.csvLayout,
        companion,
        thresholds: thresholdsVersion?.values ?? defaultThresholds,
      },
      {
        onProgress: progressWriter(dataSource, payload),
        signal: AbortSignal.any([signal, AbortSignal.timeout(config.SCREENING_TIMEOUT_MS)]),
      },
    ),
  );

  if (!result.ok) {
    await failCapture(dataSource, payload, result.failure);
    await settleOthers(context, capture);
    throw new UnrecoverableError(`${result.failure.code}: ${result.failure.message}`);
  }
  const isSaved = await dataSource.transaction((manager) =>
    saveScreening(manager, {
      captureId: capture.id,
      attempt: payload.attempt,
      thresholdsVersion: thresholdsVersion?.version ?? null,
      engineVersion,
      result: result.result,
      companion: chosen.used,
      companionNote: chosen.note ?? result.companionNote,
    }),
  );
  if (!isSaved) {
    logger.warn({ ...payload }, 'result of an overtaken attempt dropped');
    return;
  }
  await settleOthers(context, capture);
}
