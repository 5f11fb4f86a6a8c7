import type { ProjectRole } from '../../shared/schemas/account.js';
import type { Actor } from './Actor.js';

/** Roles of the actor in a project; empty for everybody else, admins included. */
export function rolesInProject(actor: Actor, projectId: string): ProjectRole[] {
  return actor.memberships.find((membership) => membership.projectId === projectId)?.roles ?? [];
}

export function isMember(actor: Actor, projectId: string): boolean {
  return actor.memberships.some((membership) => membership.projectId === projectId);
}

/** Whoever may not read a project must not learn that it exists: answer 404. */
export function canReadProject(actor: Actor, projectId: string): boolean {
  return actor.isAdmin || isMember(actor, projectId);
}

/** Name, archive, members, thresholds. */
export function canAdministerProject(actor: Actor): boolean {
  return actor.isAdmin;
}

/** Roles come from membership only: an admin who is no member neither uploads nor decides. */
export function hasProjectRole(actor: Actor, projectId: string, role: ProjectRole): boolean {
  return rolesInProject(actor, projectId).includes(role);
}
