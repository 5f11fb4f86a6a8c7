import type { DataSource, EntityManager } from 'typeorm';

export interface ProjectWithCounts {
  id: string;
  name: string;
  description: string;
  isArchived: boolean;
  createdAt: Date;
  batchCount: number;
  captureCount: number;
  awaitingReviewCount: number;
}

/** Projects with what is in them, by name, in one statement. @param ids null for all */
export async function findProjectsWithCounts(
  source: DataSource | EntityManager,
  ids: string[] | null,
): Promise<ProjectWithCounts[]> {
  return source.query(
    `select p.id, p.name, p.description, p.is_archived as "isArchived", p.created_at as "createdAt",
            (select count(*)::int from batches b where b.project_id = p.id) as "batchCount",
            count(c.id)::int as "captureCount",
            (count(c.id) filter (where c.state = 'screened' and c.decision_version = 0))::int as "awaitingReviewCount"
       from projects p left join captures c on c.project_id = p.id
      where $1::uuid[] is null or p.id = any($1)
      group by p.id
      order by p.is_archived, lower(p.name), p.id`,
    [ids],
  );
}
