import { randomUUID } from 'node:crypto';
import type { Express } from 'express';
import supertest, { type Test } from 'supertest';
import { createApp } from '../../server/app.js';
import type { AppDependencies } from '../../server/AppDependencies.js';
import type { Config } from '../../server/config/config.js';
import { Session, type User } from '../../server/entities/index.js';
import { AccessTokens } from '../../server/security/AccessTokens.js';
import { RenewalTokens } from '../../server/security/RenewalTokens.js';
import { hashSecret } from '../../server/security/secretTokens.js';
import { createTestDependencies, type TestDependencies } from './testDependencies.js';

const methods = ['get', 'post', 'put', 'patch', 'delete'] as const;
export type TestMethod = (typeof methods)[number];
/** Requests under /api/v1: `client.get('/projects')`; a path that begins with /api/ is taken as it is. */
export type TestClient = Record<TestMethod, (path: string) => Test>;

export interface TestSession {
  sessionId: string;
  token: string;
  renewalToken: string;
}

export interface TestApp {
  app: Express;
  deps: TestDependencies;
  /** Nobody is signed in. */
  anonymous: TestClient;
  /** Signed in as that user with a bearer token; a session is opened for it. */
  as: (user: Pick<User, 'id'>) => Promise<TestClient>;
  /** With any bearer token. */
  withToken: (token: string) => TestClient;
  openSession: (user: Pick<User, 'id'>) => Promise<TestSession>;
  close: () => Promise<void>;
}

function clientOf(app: Express, prepare: (test: Test) => Test): TestClient {
  const entries = methods.map((method) => [
    method,
    (path: string): Test => prepare(supertest(app)[method](path.startsWith('/api/') ? path : `/api/v1${path}`)),
  ]);
  return Object.fromEntries(entries) as TestClient;
}

/** The whole app on real PostgreSQL and Redis with an empty database. */
export async function createTestApp(
  options: { config?: Partial<Config>; deps?: Partial<AppDependencies> } = {},
): Promise<TestApp> {
  const deps: TestDependencies = { ...(await createTestDependencies(options.config)), ...options.deps };
  const app = createApp(deps);
  const tokens = new AccessTokens(deps.config.JWT_SECRET, deps.config.ACCESS_TOKEN_MINUTES, deps.now);
  const renewals = new RenewalTokens(deps.config.JWT_SECRET);

  const openSession = async ({ id: userId }: Pick<User, 'id'>): Promise<TestSession> => {
    const sessionId = randomUUID();
    const renewalToken = renewals.first(sessionId);
    await deps.dataSource.manager.insert(Session, {
      id: sessionId,
      userId,
      renewalHash: hashSecret(renewalToken),
      lastUsedAt: deps.now(),
      expiresAt: new Date(deps.now().getTime() + deps.config.SESSION_ABSOLUTE_DAYS * 86_400_000),
    });
    return { sessionId, token: tokens.issue(userId, sessionId).token, renewalToken };
  };
  const withToken = (token: string): TestClient =>
    clientOf(app, (test) => test.set('Authorization', `Bearer ${token}`));

  return {
    app,
    deps,
    anonymous: clientOf(app, (test) => test),
    as: async (user) => withToken((await openSession(user)).token),
    withToken,
    openSession,
    close: deps.release,
  };
}
