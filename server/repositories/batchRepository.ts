import type { DataSource, EntityManager } from 'typeorm';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { BatchState } from '../../shared/schemas/batch.js';
import { Batch } from '../entities/index.js';
import type { PagePosition } from './pageCursor.js';

export interface BatchRow extends PagePosition {
  projectId: string;
  projectName: string;
  name: string;
  state: BatchState;
  acquisition: AcquisitionSheet;
  createdById: string | null;
  createdByName: string | null;
  createdAt: Date;
  completedAt: Date | null;
  screenedAt: Date | null;
  captureCount: number;
  clear: number;
  limited: number;
  folded: number;
  unproven: number;
  failed: number;
  pending: number;
  decidedCount: number;
  progress: number;
}

export interface BatchFilter {
  /** Null: all projects. */
  projectIds: string[] | null;
  id?: string;
  state?: BatchState | undefined;
  after?: PagePosition | null;
  limit: number;
}

/** Batches with their counts, newest first, in one statement: the page is cut before its captures are counted. */
export function findBatches(source: DataSource | EntityManager, filter: BatchFilter): Promise<BatchRow[]> {
  return source.query(
    `WITH page AS (
       SELECT * FROM batches
        WHERE ($1::uuid[] IS NULL OR project_id = ANY($1))
          AND ($2::uuid IS NULL OR id = $2)
          AND ($3::text IS NULL OR state = $3)
          AND ($4::timestamptz IS NULL OR (created_at, id) < ($4, $5::uuid))
        ORDER BY created_at DESC, id DESC LIMIT $6)
     SELECT b.id, b.created_at::text AS key, b.project_id AS "projectId", p.name AS "projectName", b.name, b.state,
            b.acquisition, b.created_by_id AS "createdById", u.name AS "createdByName", b.created_at AS "createdAt",
            b.completed_at AS "completedAt", b.screened_at AS "screenedAt", n.*
       FROM page b
       JOIN projects p ON p.id = b.project_id
       LEFT JOIN users u ON u.id = b.created_by_id
       CROSS JOIN LATERAL (
         SELECT count(*)::int AS "captureCount",
                (count(*) FILTER (WHERE state = 'screened' AND verdict = 'clear'))::int AS clear,
                (count(*) FILTER (WHERE state = 'screened' AND verdict = 'limited'))::int AS limited,
                (count(*) FILTER (WHERE state = 'screened' AND verdict = 'folded'))::int AS folded,
                (count(*) FILTER (WHERE state = 'screened' AND verdict = 'unproven'))::int AS unproven,
                (count(*) FILTER (WHERE state = 'failed'))::int AS failed,
                (count(*) FILTER (WHERE state NOT IN ('screened', 'failed')))::int AS pending,
                (count(*) FILTER (WHERE decision_version > 0))::int AS "decidedCount",
                coalesce(avg(CASE WHEN state IN ('screened', 'failed') THEN 1 ELSE progress END), 0)::float8 AS progress
           FROM captures WHERE batch_id = b.id) n
      ORDER BY b.created_at DESC, b.id DESC`,
    [
      filter.projectIds,
      filter.id ?? null,
      filter.state ?? null,
      filter.after?.key ?? null,
      filter.after?.id ?? null,
      filter.limit,
    ],
  );
}

/**
 * Holds the batch's row until the transaction ends. Everything that opens a batch again, closes it, or adds to it takes
 * this lock first, so that its end is decided on what is committed.
 */
export function lockBatch(manager: EntityManager, batchId: string): Promise<Batch> {
  return manager.findOneOrFail(Batch, { where: { id: batchId }, lock: { mode: 'pessimistic_write' } });
}

/** A capture of a batch under review is screened again: the batch is being screened until that has ended. */
export async function reopenBatch(manager: EntityManager, batch: Batch): Promise<void> {
  if (batch.state === 'review') await manager.update(Batch, { id: batch.id }, { state: 'screening' });
}
