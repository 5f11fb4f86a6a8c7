import type { DataSource } from 'typeorm';
import type { StartPage } from '../../shared/schemas/system.js';

/** What waits in these projects, in one statement. */
export async function countWaiting(source: DataSource, projectIds: string[]): Promise<StartPage> {
  const [row] = await source.query<Record<string, number>[]>(
    `SELECT (SELECT count(*)::int FROM captures
              WHERE project_id = ANY($1::uuid[]) AND state = 'screened' AND decision_version = 0) AS awaiting,
            (SELECT count(*)::int FROM decisions d JOIN captures c ON c.id = d.capture_id
              WHERE d.decision = 'retake' AND d.version = c.decision_version AND c.project_id = ANY($1)) AS retakes,
            (count(*) FILTER (WHERE state = 'failed'))::int AS failed,
            (count(*) FILTER (WHERE state IN ('received', 'queued')))::int AS waiting,
            (count(*) FILTER (WHERE state = 'screening'))::int AS screening
       FROM captures
      WHERE project_id = ANY($1) AND state IN ('received', 'queued', 'screening', 'failed')`,
    [projectIds],
  );
  return {
    awaitingReview: row?.awaiting ?? 0,
    retakesAsked: row?.retakes ?? 0,
    failedCaptures: row?.failed ?? 0,
    queue: { waiting: row?.waiting ?? 0, screening: row?.screening ?? 0 },
  };
}
