import type { SessionUser } from '@shared/schemas/account.js';

export const sessionUser = (changes: Partial<SessionUser> = {}): SessionUser => ({
  id: 'b7a7c1d4-6f0e-4f6b-9a53-0d3f5b1c2e11',
  email: 'ines@marram.example',
  name: 'Ines',
  isAdmin: false,
  memberships: [{ projectId: 'p1', projectName: 'Ferrow Quay', roles: ['reviewer'] }],
  ...changes,
});
