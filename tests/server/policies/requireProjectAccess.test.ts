import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import type { ProjectRole } from '../../../shared/schemas/account.js';
import { AppError } from '../../../server/errors/index.js';
import type { Actor } from '../../../server/policies/Actor.js';
import {
  requireProjectAdministrator,
  requireProjectReader,
  requireProjectRole,
} from '../../../server/policies/requireProjectAccess.js';

const projectId = randomUUID();

function actor(isAdmin: boolean, roles: ProjectRole[] | null, ofProject = projectId): Actor {
  const memberships = roles ? [{ projectId: ofProject, projectName: 'P', roles }] : [];
  return { userId: randomUUID(), email: 'a@marram.example', name: 'A', isAdmin, sessionId: randomUUID(), memberships };
}

function statusOf(check: () => void): number {
  try {
    check();
    return 200;
  } catch (error) {
    if (error instanceof AppError) return error.status;
    throw error;
  }
}

const rows: [string, Actor, { read: number; analyse: number; review: number; administer: number }][] = [
  ['a stranger', actor(false, null), { read: 404, analyse: 404, review: 404, administer: 404 }],
  [
    'an analyst of another project',
    actor(false, ['analyst', 'reviewer'], randomUUID()),
    { read: 404, analyse: 404, review: 404, administer: 404 },
  ],
  ['an analyst', actor(false, ['analyst']), { read: 200, analyse: 200, review: 403, administer: 403 }],
  ['a reviewer', actor(false, ['reviewer']), { read: 200, analyse: 403, review: 200, administer: 403 }],
  ['a QA manager', actor(false, ['qaManager']), { read: 200, analyse: 403, review: 403, administer: 403 }],
  [
    'a member with two roles',
    actor(false, ['analyst', 'reviewer']),
    { read: 200, analyse: 200, review: 200, administer: 403 },
  ],
  ['an administrator without membership', actor(true, null), { read: 200, analyse: 403, review: 403, administer: 200 }],
  [
    'an administrator who reviews',
    actor(true, ['reviewer']),
    { read: 200, analyse: 403, review: 200, administer: 200 },
  ],
];

describe('access to a project', () => {
  it.each(rows)('of %s', (_name, who, expected) => {
    expect({
      read: statusOf(() => requireProjectReader(who, projectId)),
      analyse: statusOf(() => requireProjectRole(who, projectId, 'analyst')),
      review: statusOf(() => requireProjectRole(who, projectId, 'reviewer')),
      administer: statusOf(() => requireProjectAdministrator(who, projectId)),
    }).toEqual(expected);
  });
});
