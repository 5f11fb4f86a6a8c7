import type { EntityManager } from 'typeorm';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { PutAcquisition } from '../../shared/schemas/capture.js';
import { judgeCapture } from '../../shared/screening/judgeCapture.js';
import { judgeChannels } from '../../shared/screening/judgeChannels.js';
import { needsNewMeasurement } from '../../shared/screening/needsNewMeasurement.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Capture, ChannelResult, type Batch } from '../entities/index.js';
import { ConflictError, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { refuseEdit } from '../policies/capturePolicy.js';
import { requireProjectReader } from '../policies/requireProjectAccess.js';
import { relayNow } from '../queues/relayNow.js';
import { screenPairsAgain } from '../queues/screenPairsAgain.js';
import { screenPairsElsewhere } from '../queues/screenPairsElsewhere.js';
import { lockBatch, reopenBatch } from '../repositories/batchRepository.js';
import { saveJudgement } from '../repositories/saveJudgement.js';
import { sendToScreening } from '../repositories/sendToScreening.js';
import { findCurrentThresholds } from '../repositories/thresholdsRepository.js';
import { addAuditEntry } from './audit.js';

/** Judges the stored measurements again, with another sheet and the thresholds now in force. */
async function judgeAgain(manager: EntityManager, capture: Capture, sheet: AcquisitionSheet): Promise<void> {
  const { version, values } = await findCurrentThresholds(manager, capture.projectId);
  const results = await manager.find(ChannelResult, {
    where: { captureId: capture.id },
    order: { channelIndex: 'ASC' },
  });
  const judgements = judgeChannels(
    results.map(({ measurement }) => measurement),
    values,
    sheet,
  );
  const screens = results.flatMap(({ screen }, index) => {
    const judgement = judgements[index];
    return judgement === undefined ? [] : [{ ...screen, ...judgement }];
  });
  await saveJudgement(manager, {
    captureId: capture.id,
    thresholdsVersion: version,
    judgement: judgeCapture(screens),
    screens,
  });
}

/** Changing how a capture is read and judged, and screening it once more. */
export class CaptureEditService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource' | 'queue' | 'logger'>) {}

  /** A changed sheet is judged at once from what was measured; only what the measurement itself used asks for the file. */
  async changeAcquisition(actor: Actor, captureId: string, put: PutAcquisition): Promise<void> {
    await this.withLockedCapture(actor, captureId, async (manager, capture, batch) => {
      const csvLayout = put.csvLayout === undefined ? capture.csvLayout : put.csvLayout;
      const before = { sheet: { ...batch.acquisition, ...capture.acquisition }, csvLayout: capture.csvLayout };
      const after = { sheet: { ...batch.acquisition, ...put.acquisition }, csvLayout };
      const isJudgedOnly = capture.state === 'screened' && !needsNewMeasurement(before, after);
      if (isJudgedOnly) {
        await manager.update(Capture, { id: captureId }, { acquisition: put.acquisition, csvLayout });
        await judgeAgain(manager, capture, after.sheet);
      } else {
        await sendToScreening(manager, captureId, { acquisition: put.acquisition, csvLayout });
        await reopenBatch(manager, batch);
      }
      await addAuditEntry(manager, {
        actor,
        projectId: capture.projectId,
        entityType: 'capture',
        entityId: captureId,
        action: 'changedAcquisition',
        text: isJudgedOnly
          ? 'changed the acquisition sheet; judged again from the stored measurement'
          : 'changed the acquisition sheet; the file is screened again',
        details: { before: capture.acquisition, after: put.acquisition },
      });
      await screenPairsAgain(manager, batch);
    });
    await screenPairsElsewhere(this.deps.dataSource, [captureId]);
    await relayNow(this.deps);
  }

  /** Screens a failed capture once more. */
  async retry(actor: Actor, captureId: string): Promise<void> {
    await this.withLockedCapture(actor, captureId, async (manager, capture, batch) => {
      if (capture.state !== 'failed') {
        throw new ConflictError('NOT_FAILED', 'Only a capture that could not be screened can be retried.');
      }
      await sendToScreening(manager, captureId);
      await reopenBatch(manager, batch);
      await addAuditEntry(manager, {
        actor,
        projectId: capture.projectId,
        entityType: 'capture',
        entityId: captureId,
        action: 'retried',
        text: 'asked to screen it once more',
        details: { failure: capture.failureCode },
      });
    });
    await relayNow(this.deps);
  }

  /** Access, then batch and capture locked in this order, then the work, in one transaction. */
  private async withLockedCapture(
    actor: Actor,
    captureId: string,
    work: (manager: EntityManager, capture: Capture, batch: Batch) => Promise<void>,
  ): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      const found = await manager.findOneBy(Capture, { id: captureId });
      if (!found) throw new NotFoundError();
      requireProjectReader(actor, found.projectId);
      const batch = await lockBatch(manager, found.batchId);
      const refusal = refuseEdit(actor, { projectId: found.projectId, batchState: batch.state });
      if (refusal) throw refusal;
      const capture = await manager.findOneOrFail(Capture, {
        where: { id: captureId },
        lock: { mode: 'pessimistic_write' },
      });
      await work(manager, capture, batch);
    });
  }
}
