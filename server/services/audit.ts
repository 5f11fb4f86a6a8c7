import type { EntityManager } from 'typeorm';
import { AuditEntry } from '../entities/index.js';
import type { Actor } from '../policies/Actor.js';

export interface NewAuditEntry {
  /** Null for the product itself and for commands. */
  actor: Pick<Actor, 'userId' | 'name'> | null;
  projectId?: string | null;
  entityType: AuditEntry['entityType'];
  entityId?: string | null;
  /** Verb in the past: `uploaded`, `decided`. */
  action: string;
  /** One sentence without the actor's name: "set the roles of Ada to reviewer". */
  text: string;
  details?: Record<string, unknown>;
}

/** Adds to the record of who did what, in the transaction of the act itself: neither exists without the other. */
export async function addAuditEntry(manager: EntityManager, entry: NewAuditEntry): Promise<void> {
  await manager.insert(AuditEntry, {
    actorId: entry.actor?.userId ?? null,
    actorName: entry.actor?.name ?? null,
    projectId: entry.projectId ?? null,
    entityType: entry.entityType,
    entityId: entry.entityId ?? null,
    action: entry.action,
    text: entry.text,
    // The typed partial of TypeORM does not accept an open record; JSON is what the column takes.
    details: (entry.details ?? {}) as object,
  });
}
