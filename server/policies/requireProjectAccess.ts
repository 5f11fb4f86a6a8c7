import type { ProjectRole } from '../../shared/schemas/account.js';
import { ForbiddenError, NotFoundError } from '../errors/index.js';
import type { Actor } from './Actor.js';
import { canAdministerProject, canReadProject, hasProjectRole } from './projectPolicy.js';

const roleWords: Record<ProjectRole, string> = {
  analyst: 'an analyst',
  reviewer: 'a reviewer',
  qaManager: 'a QA manager',
};

/** @throws NotFoundError like for a missing project */
export function requireProjectReader(actor: Actor, projectId: string): void {
  if (!canReadProject(actor, projectId)) throw new NotFoundError();
}

/** @throws NotFoundError for strangers, ForbiddenError for members without the role */
export function requireProjectRole(actor: Actor, projectId: string, role: ProjectRole): void {
  requireProjectReader(actor, projectId);
  if (!hasProjectRole(actor, projectId, role)) {
    throw new ForbiddenError('FORBIDDEN', `Only ${roleWords[role]} of this project may do this. Ask an administrator.`);
  }
}

/** @throws NotFoundError for strangers, ForbiddenError for members */
export function requireProjectAdministrator(actor: Actor, projectId: string): void {
  requireProjectReader(actor, projectId);
  if (!canAdministerProject(actor)) {
    throw new ForbiddenError('FORBIDDEN', 'Only an administrator may do this.');
  }
}
