import type { SessionUser } from '../../shared/schemas/account.js';
import type { Actor } from '../policies/Actor.js';

export function presentSessionUser(actor: Actor): SessionUser {
  return {
    id: actor.userId,
    email: actor.email,
    name: actor.name,
    isAdmin: actor.isAdmin,
    memberships: actor.memberships.map(({ projectId, projectName, roles }) => ({ projectId, projectName, roles })),
  };
}
