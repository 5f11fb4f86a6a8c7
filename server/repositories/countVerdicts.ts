import type { EntityManager } from 'typeorm';
import type { VerdictCounts } from '../../shared/schemas/batch.js';

/** Captures of a batch by verdict; those neither screened nor failed are pending. */
export async function countVerdicts(manager: EntityManager, batchId: string): Promise<VerdictCounts> {
  const rows = (await manager.query(
    `SELECT CASE WHEN state = 'screened' THEN verdict WHEN state = 'failed' THEN 'failed' ELSE 'pending' END AS outcome,
            count(*)::int AS count
       FROM captures WHERE batch_id = $1 GROUP BY 1`,
    [batchId],
  )) as { outcome: keyof VerdictCounts; count: number }[];
  const counts: VerdictCounts = { clear: 0, limited: 0, folded: 0, unproven: 0, failed: 0, pending: 0 };
  for (const { outcome, count } of rows) counts[outcome] = count;
  return counts;
}
