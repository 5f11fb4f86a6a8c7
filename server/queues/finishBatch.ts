import { In, Not, type DataSource, type EntityManager } from 'typeorm';
import type { Config } from '../config/config.js';
import { AuditEntry, Batch, Capture } from '../entities/index.js';
import { batchScreenedMail, type FlaggedCapture } from '../mailbox/batchScreenedMail.js';
import { queueMail } from '../mailbox/queueMail.js';
import { countVerdicts } from '../repositories/countVerdicts.js';
import { screenPairsAgain } from './screenPairsAgain.js';

const listedFlagged = 30;

interface Recipient {
  id: string;
  name: string;
  email: string;
}

/** The project's QA managers, and whoever uploaded to the batch; each once, only active people. */
function findRecipients(manager: EntityManager, batch: Batch): Promise<Recipient[]> {
  return manager.query(
    `SELECT id, name, email FROM users
      WHERE is_active AND id IN (
        SELECT user_id FROM memberships WHERE project_id = $1 AND 'qaManager' = ANY(roles)
        UNION SELECT uploaded_by_id FROM captures WHERE batch_id = $2
        UNION SELECT created_by_id FROM batches WHERE id = $2)
      ORDER BY email`,
    [batch.projectId, batch.id],
  );
}

async function findFlagged(manager: EntityManager, batchId: string, publicUrl: string): Promise<FlaggedCapture[]> {
  const rows = (await manager.query(
    `SELECT id, file_name, coalesce(verdict, 'failed') AS outcome, coalesce(headline, failure_message, '') AS reason
       FROM captures WHERE batch_id = $1 AND (state = 'failed' OR verdict <> 'clear')
      ORDER BY array_position(ARRAY['folded', 'failed', 'unproven', 'limited'], coalesce(verdict, 'failed')::text), file_name`,
    [batchId],
  )) as { id: string; file_name: string; outcome: string; reason: string }[];
  return rows.map((row) => ({
    fileName: row.file_name,
    outcome: row.outcome,
    reason: row.reason,
    url: `${publicUrl}/captures/${row.id}`,
  }));
}

async function queueSummaries(manager: EntityManager, config: Config, batch: Batch): Promise<void> {
  const flagged = await findFlagged(manager, batch.id, config.publicUrl);
  const counts = await countVerdicts(manager, batch.id);
  for (const recipient of await findRecipients(manager, batch)) {
    await queueMail(manager, {
      dedupeKey: `batchScreened:${batch.id}:${recipient.id}`,
      kind: 'batchScreened',
      recipient: recipient.email,
      ...batchScreenedMail({
        recipientName: recipient.name,
        projectName: batch.project.name,
        batchName: batch.name,
        counts,
        flagged: flagged.slice(0, listedFlagged),
        moreFlagged: Math.max(0, flagged.length - listedFlagged),
        url: `${config.publicUrl}/batches/${batch.id}`,
      }),
    });
  }
}

/**
 * To be called when a capture's screening has ended. With nothing pending in the batch, captures whose companion is another
 * one by now are screened again; with none of those either, a closed batch moves from `screening` to `review`, and the summary
 * mails are written in the same transaction. One statement decides, so that of several callers exactly one finishes it.
 * @returns whether this call finished the batch
 */
export function finishBatch(dataSource: DataSource, config: Config, batchId: string): Promise<boolean> {
  return dataSource.transaction(async (manager) => {
    // The lock first, in a statement of its own: the second one then counts what is committed by whoever held it before.
    const open = await manager.findOne(Batch, {
      where: { id: batchId, state: In(['receiving', 'screening', 'review']) },
      lock: { mode: 'pessimistic_write' },
    });
    const isPending = await manager.existsBy(Capture, { batchId, state: Not(In(['screened', 'failed'])) });
    if (!open || isPending || (await screenPairsAgain(manager, open)) > 0) return false;
    const [, affected] = (await manager.query(
      `UPDATE batches SET state = 'review', screened_at = coalesce(screened_at, now())
        WHERE id = $1 AND state = 'screening' AND completed_at IS NOT NULL
          AND NOT EXISTS (SELECT 1 FROM captures WHERE batch_id = $1 AND state NOT IN ('screened', 'failed'))`,
      [batchId],
    )) as [unknown, number];
    if (affected === 0) return false;
    const batch = await manager.findOneOrFail(Batch, { where: { id: batchId }, relations: { project: true } });
    await manager.insert(AuditEntry, {
      projectId: batch.projectId,
      entityType: 'batch',
      entityId: batchId,
      action: 'screened',
      text: 'all captures screened',
    });
    await queueSummaries(manager, config, batch);
    return true;
  });
}

/** Finishes every batch whose last capture ended while the process that should have noticed died. */
export async function finishDueBatches(dataSource: DataSource, config: Config): Promise<void> {
  const due = (await dataSource.query(
    `SELECT id FROM batches b WHERE state = 'screening' AND completed_at IS NOT NULL
        AND NOT EXISTS (SELECT 1 FROM captures WHERE batch_id = b.id AND state NOT IN ('screened', 'failed'))`,
  )) as { id: string }[];
  for (const { id } of due) await finishBatch(dataSource, config, id);
}
