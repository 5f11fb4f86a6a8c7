import type { DataSource, EntityManager } from 'typeorm';
import type { ProjectRole } from '../../shared/schemas/account.js';
import { Session } from '../entities/index.js';
import type { Actor } from '../policies/Actor.js';

export interface LiveSession {
  actor: Actor;
  lastUsedAt: Date;
  expiresAt: Date;
}

interface ActorRow {
  user_id: string;
  email: string;
  name: string;
  is_admin: boolean;
  last_used_at: Date;
  expires_at: Date;
  memberships: { projectId: string; projectName: string; roles: ProjectRole[] }[];
}

/** Session, user and memberships in one statement: it runs on every request. Null when ended or deactivated. */
export async function findLiveSession(
  source: DataSource | EntityManager,
  sessionId: string,
  userId: string,
): Promise<LiveSession | null> {
  const rows: ActorRow[] = await source.query(
    `select u.id as user_id, u.email, u.name, u.is_admin, s.last_used_at, s.expires_at,
            coalesce((select json_agg(json_build_object('projectId', p.id, 'projectName', p.name, 'roles', m.roles)
                                      order by p.name)
                        from memberships m join projects p on p.id = m.project_id
                       where m.user_id = u.id), '[]'::json) as memberships
       from sessions s join users u on u.id = s.user_id
      where s.id = $1 and u.id = $2 and s.revoked_at is null and u.is_active`,
    [sessionId, userId],
  );
  const row = rows[0];
  if (!row) return null;
  return {
    actor: {
      userId: row.user_id,
      email: row.email,
      name: row.name,
      isAdmin: row.is_admin,
      sessionId,
      memberships: row.memberships,
    },
    lastUsedAt: row.last_used_at,
    expiresAt: row.expires_at,
  };
}

/** Notes the use of a session and of its user, for the idle limit and for the list of users. */
export async function touchSession(source: DataSource | EntityManager, sessionId: string, at: Date): Promise<void> {
  await source.query(
    `with touched as (update sessions set last_used_at = $2 where id = $1 and last_used_at < $2 returning user_id)
     update users set last_seen_at = $2 from touched where users.id = touched.user_id`,
    [sessionId, at],
  );
}

/** Ends sessions of a user. @param exceptSessionId stays */
export async function revokeSessions(
  manager: EntityManager,
  userId: string,
  at: Date,
  exceptSessionId: string | null = null,
): Promise<void> {
  const update = manager
    .createQueryBuilder()
    .update(Session)
    .set({ revokedAt: at })
    .where('userId = :userId and revokedAt is null', { userId });
  if (exceptSessionId) update.andWhere('id <> :exceptSessionId', { exceptSessionId });
  await update.execute();
}
