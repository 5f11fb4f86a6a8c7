import type { ProjectRole } from '../../shared/schemas/account.js';

/** Who asks: read from the database on each request, so that a change of role acts on the next one. */
export interface Actor {
  userId: string;
  email: string;
  name: string;
  isAdmin: boolean;
  sessionId: string;
  memberships: { projectId: string; projectName: string; roles: ProjectRole[] }[];
}
