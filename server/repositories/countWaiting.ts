import type { DataSource } from 'typeorm';
import type { StartPage } from '../../shared/schemas/system.js';

/** What waits in these projects, in one statement. */
export async function countWaiting(source: DataSource, projectIds: string[]): Promise<StartPage> {
  const [row] = await source.query<Record<string, number>[]>(
    `SELECT (count(*) FILTER (WHERE c.state = 'screened' AND c.decision_version = 0))::int AS awaiting,
            (count(*) FILTER (WHERE d.decision = 'retake'))::int AS retakes,
            (count(*) FILTER (WHERE c.state = 'failed'))::int AS failed,
            (count(*) FILTER (WHERE c.state IN ('received', 'queued')))::int AS waiting,
            (count(*) FILTER (WHERE c.state = 'screening'))::int AS screening
       FROM captures c
       LEFT JOIN decisions d ON d.capture_id = c.id AND d.version = c.decision_version
      WHERE c.project_id = ANY($1::uuid[])`,
    [projectIds],
  );
  return {
    awaitingReview: row?.awaiting ?? 0,
    retakesAsked: row?.retakes ?? 0,
    failedCaptures: row?.failed ?? 0,
    queue: { waiting: row?.waiting ?? 0, screening: row?.screening ?? 0 },
  };
}
