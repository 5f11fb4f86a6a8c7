import type { z } from 'zod';
import type { batchListQuerySchema, createBatchSchema, updateBatchSchema } from '../../shared/schemas/batch.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Batch, Capture, Project } from '../entities/index.js';
import { ConflictError, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { refuseEdit } from '../policies/capturePolicy.js';
import { requireProjectReader, requireProjectRole } from '../policies/requireProjectAccess.js';
import { finishBatch } from '../queues/finishBatch.js';
import { findBatches, lockBatch, type BatchRow } from '../repositories/batchRepository.js';
import { cutPage, pageCursor } from '../repositories/pageCursor.js';
import { addAuditEntry } from './audit.js';

const order = 'newest';

export class BatchService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource' | 'config'>) {}

  /** Batches of one project, or of all the actor may read. */
  async list(actor: Actor, projectId: string | null, query: z.output<typeof batchListQuerySchema>) {
    if (projectId !== null) requireProjectReader(actor, projectId);
    const own = actor.isAdmin ? null : actor.memberships.map((membership) => membership.projectId);
    const rows = await findBatches(this.deps.dataSource, {
      projectIds: projectId === null ? own : [projectId],
      state: query.state,
      after: pageCursor.decode(query.cursor, order, 'time'),
      limit: query.limit + 1,
    });
    return cutPage(rows, query.limit, order);
  }

  async read(actor: Actor, batchId: string): Promise<BatchRow> {
    const [row] = await findBatches(this.deps.dataSource, { projectIds: null, id: batchId, limit: 1 });
    if (!row) throw new NotFoundError();
    requireProjectReader(actor, row.projectId);
    return row;
  }

  async create(
    actor: Actor,
    projectId: string,
    { name, acquisition }: z.output<typeof createBatchSchema>,
  ): Promise<BatchRow> {
    requireProjectRole(actor, projectId, 'analyst');
    const batchId = await this.deps.dataSource.transaction(async (manager) => {
      const project = await manager.findOneBy(Project, { id: projectId });
      if (!project) throw new NotFoundError();
      if (project.isArchived) {
        throw new ConflictError('PROJECT_ARCHIVED', 'This project is archived: it takes no new batches.');
      }
      const batch = await manager.save(
        manager.create(Batch, { projectId, name, acquisition, createdById: actor.userId }),
      );
      await addAuditEntry(manager, {
        actor,
        projectId,
        entityType: 'batch',
        entityId: batch.id,
        action: 'created',
        text: `created the batch ${name}`,
      });
      return batch.id;
    });
    return this.read(actor, batchId);
  }

  async rename(actor: Actor, batchId: string, { name }: z.output<typeof updateBatchSchema>): Promise<BatchRow> {
    const before = await this.requireEditable(actor, batchId);
    if (name === undefined || name === before.name) return before;
    await this.deps.dataSource.transaction(async (manager) => {
      await manager.update(Batch, { id: batchId }, { name });
      await addAuditEntry(manager, {
        actor,
        projectId: before.projectId,
        entityType: 'batch',
        entityId: batchId,
        action: 'renamed',
        text: `renamed the batch ${before.name} to ${name}`,
      });
    });
    return this.read(actor, batchId);
  }

  /** No more files: from now on the batch ends when its last capture does. Once more changes nothing. */
  async complete(actor: Actor, batchId: string): Promise<BatchRow> {
    await this.requireEditable(actor, batchId);
    const { dataSource, config } = this.deps;
    await dataSource.transaction(async (manager) => {
      const batch = await lockBatch(manager, batchId);
      if (batch.completedAt !== null) return;
      const captureCount = await manager.countBy(Capture, { batchId });
      if (captureCount === 0) {
        throw new ConflictError('BATCH_EMPTY', 'The batch holds no capture yet. Upload at least one file first.');
      }
      await manager.update(Batch, { id: batchId }, { state: 'screening', completedAt: () => 'now()' });
      await addAuditEntry(manager, {
        actor,
        projectId: batch.projectId,
        entityType: 'batch',
        entityId: batchId,
        action: 'completed',
        text: `closed the upload with ${captureCount} ${captureCount === 1 ? 'capture' : 'captures'}`,
        details: { captureCount },
      });
    });
    await finishBatch(dataSource, config, batchId);
    return this.read(actor, batchId);
  }

  private async requireEditable(actor: Actor, batchId: string): Promise<BatchRow> {
    const row = await this.read(actor, batchId);
    const refusal = refuseEdit(actor, { projectId: row.projectId, batchState: row.state });
    if (refusal) throw refusal;
    return row;
  }
}
