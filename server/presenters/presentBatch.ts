import type { BatchDto } from '../../shared/schemas/batch.js';
import type { BatchRow } from '../repositories/batchRepository.js';

export function presentBatch(row: BatchRow): BatchDto {
  const { clear, limited, folded, unproven, failed, pending } = row;
  return {
    id: row.id,
    projectId: row.projectId,
    projectName: row.projectName,
    name: row.name,
    state: row.state,
    acquisition: row.acquisition,
    counts: { clear, limited, folded, unproven, failed, pending },
    decidedCount: row.decidedCount,
    progress: row.progress,
    createdBy: row.createdById && row.createdByName ? { id: row.createdById, name: row.createdByName } : null,
    createdAt: row.createdAt.toISOString(),
    completedAt: row.completedAt?.toISOString() ?? null,
    screenedAt: row.screenedAt?.toISOString() ?? null,
  };
}
