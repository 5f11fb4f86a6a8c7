import { randomUUID } from 'node:crypto';
import { writeFile } from 'node:fs/promises';
import path from 'node:path';
import type { Test } from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { projectRoles } from '../../shared/schemas/account.js';
import { Batch, Capture, MailMessage, type User } from '../../server/entities/index.js';
import { queueMail } from '../../server/mailbox/queueMail.js';
import { newStorageKey } from '../../server/storage/newStorageKey.js';
import { buildMember } from '../support/factories/buildMember.js';
import { buildProject } from '../support/factories/buildProject.js';
import { buildUser } from '../support/factories/buildUser.js';
import { errorOf } from '../support/errorOf.js';
import { expressRoutes } from '../support/expressRoutes.js';
import { createTestApp, type TestApp, type TestClient } from '../support/testApp.js';
import { askers, authorizationMatrix, type Asker, type MatrixFixture, type MatrixRow } from './authorizationMatrix.js';

let app: TestApp;
let users: Record<Exclude<Asker, 'nobody'>, User>;
let fixture: MatrixFixture;

async function storeFile(): Promise<string> {
  const key = newStorageKey();
  const temporaryPath = path.join(app.deps.storage.temporaryDir, randomUUID());
  await app.deps.storage.check();
  await writeFile(temporaryPath, 'time;value\n0;1\n');
  await app.deps.storage.save(key, temporaryPath);
  return key;
}

async function buildCaptures(
  projectId: string,
): Promise<Omit<MatrixFixture, 'projectId' | 'analystId' | 'otherUserId' | 'invitedUserId' | 'failedMailId'>> {
  const { manager } = app.deps.dataSource;
  const batch = await manager.save(manager.create(Batch, { projectId, name: 'Hall 1', createdById: users.analyst.id }));
  const common = { batchId: batch.id, projectId, format: 'csv', sizeBytes: 15, sha256: '0'.repeat(64) } as const;
  const screened = await manager.save(
    manager.create(Capture, {
      ...common,
      fileName: 'screened.csv',
      storageKey: await storeFile(),
      state: 'screened',
      verdict: 'clear',
      screenedAt: new Date(),
    }),
  );
  const failed = await manager.save(
    manager.create(Capture, {
      ...common,
      fileName: 'failed.csv',
      storageKey: newStorageKey(),
      state: 'failed',
      failureCode: 'RAGGED',
      failureMessage: 'Line 3 has too few columns.',
    }),
  );
  return { batchId: batch.id, screenedCaptureId: screened.id, failedCaptureId: failed.id };
}

async function buildFailedMail(): Promise<string> {
  const { manager } = app.deps.dataSource;
  const dedupeKey = randomUUID();
  await queueMail(manager, {
    dedupeKey,
    kind: 'invitation',
    recipient: 'a@x.example',
    subject: 'S',
    text: 'T',
    html: 'H',
  });
  await manager.update(MailMessage, { dedupeKey }, { state: 'failed' });
  return (await manager.findOneByOrFail(MailMessage, { dedupeKey })).id;
}

beforeAll(async () => {
  app = await createTestApp({ config: { SIGN_IN_ATTEMPTS_PER_15_MIN: 10_000 } });
});
afterAll(() => app.close());

beforeEach(async () => {
  const { dataSource } = app.deps;
  await dataSource.query('truncate users, projects, mail_messages cascade');
  const project = await buildProject(dataSource);
  const foreign = await buildProject(dataSource);
  users = {
    stranger: await buildUser(dataSource),
    foreign: await buildMember(dataSource, foreign.id, [...projectRoles]),
    analyst: await buildMember(dataSource, project.id, ['analyst']),
    reviewer: await buildMember(dataSource, project.id, ['reviewer']),
    qaManager: await buildMember(dataSource, project.id, ['qaManager']),
    admin: await buildUser(dataSource, { isAdmin: true }),
  };
  fixture = {
    projectId: project.id,
    ...(await buildCaptures(project.id)),
    analystId: users.analyst.id,
    otherUserId: (await buildUser(dataSource)).id,
    invitedUserId: (await buildUser(dataSource, { password: null })).id,
    failedMailId: await buildFailedMail(),
  };
});

const clientOf = (asker: Asker): Promise<TestClient> | TestClient =>
  asker === 'nobody' ? app.anonymous : app.as(users[asker]);

function send(client: TestClient, row: MatrixRow): Test {
  let test = client[row.method](row.url(fixture));
  for (const [name, content] of Object.entries(row.files ?? {}))
    test = test.attach('files', Buffer.from(content), name);
  return row.files ? test : test.send(row.body);
}

const nameOf = (row: MatrixRow): string => `${row.method.toUpperCase()} ${row.path}`;

describe('the authorization matrix', () => {
  it('has one row for every route that Express serves', () => {
    expect(authorizationMatrix.map(nameOf).sort()).toEqual(expressRoutes(app.app));
  });

  it.each(authorizationMatrix.map((row) => [nameOf(row), row] as const))(
    '%s answers each role as laid down',
    async (_name, row) => {
      // Those who are refused come first: the one who may changes what the others ask about.
      const order = [...askers].sort((a, b) => row.expected[b] - row.expected[a]);
      const answers: Partial<Record<Asker, number>> = {};
      for (const asker of order) {
        const response = await send(await clientOf(asker), row);
        answers[asker] = response.status;
        if (response.status >= 400) errorOf(response);
      }
      expect(answers).toEqual(row.expected);
    },
  );
});

describe('things of another project', () => {
  const rowsWithId = authorizationMatrix.filter(({ path: place }) => /:(projectId|batchId|captureId)/.test(place));

  it('covers every route under a project, a batch or a capture', () => {
    expect(rowsWithId.length).toBeGreaterThan(15);
  });

  it.each(rowsWithId.map((row) => [nameOf(row), row] as const))(
    '%s answers the same for a foreign id as for one that does not exist',
    async (_name, row) => {
      const client = await app.as(users.foreign);
      const foreignAnswer = await send(client, row);
      const real = fixture;
      fixture = {
        ...real,
        projectId: randomUUID(),
        batchId: randomUUID(),
        screenedCaptureId: randomUUID(),
        failedCaptureId: randomUUID(),
      };
      const missingAnswer = await send(client, row);
      expect(errorOf(foreignAnswer)).toEqual({ status: 404, code: 'NOT_FOUND' });
      expect(errorOf(missingAnswer)).toEqual({ status: 404, code: 'NOT_FOUND' });
      expect(foreignAnswer.body.error.message).toBe(missingAnswer.body.error.message);
    },
  );

  it.each(['/projects', '/batches', '/review?decided=all', '/start', '/session'])(
    'are in no list: %s',
    async (place) => {
      const own = await (await app.as(users.analyst)).get(place);
      const response = await (await app.as(users.foreign)).get(place);
      expect(response.status).toBe(200);
      expect(own.status).toBe(200);
      for (const id of Object.values(fixture)) expect(response.text).not.toContain(id);
    },
  );

  it('are out of reach for a member from the request after the membership ended', async () => {
    const client = await app.as(users.reviewer);
    const ask = () => client.get(`/captures/${fixture.screenedCaptureId}`);
    expect((await ask()).status).toBe(200);
    await app.deps.dataSource.query('delete from memberships where user_id = $1', [users.reviewer.id]);
    expect(errorOf(await ask())).toEqual({ status: 404, code: 'NOT_FOUND' });
  });
});

describe('a change made with the sign-in cookie', () => {
  const writes = authorizationMatrix.filter(
    ({ method, expected }) => method !== 'get' && expected.nobody === 401 && expected.admin !== 401,
  );

  it.each(writes.map((row) => [nameOf(row), row] as const))(
    '%s needs the header that pages of other sites cannot send',
    async (_name, row) => {
      const { token } = await app.openSession(users.admin);
      const withCookie = (): Test =>
        send(app.anonymous, row).set('Cookie', `overfold_access=${token}`).set('Origin', 'https://evil.example');
      expect(errorOf(await withCookie())).toEqual({ status: 403, code: 'CLIENT_HEADER_MISSING' });
      const allowed = await withCookie().set('X-Overfold-Client', 'web');
      expect(allowed.status).toBe(row.expected.admin);
    },
  );
});

describe('what has ended', () => {
  const protectedRows = authorizationMatrix.filter(({ expected }) => expected.nobody === 401 && expected.admin !== 401);

  it.each(protectedRows.map((row) => [nameOf(row), row] as const))(
    '%s refuses the token of a session that was signed out',
    async (_name, row) => {
      const client = await app.as(users.admin);
      expect((await client.delete('/session')).status).toBe(204);
      expect(errorOf(await send(client, row))).toEqual({ status: 401, code: 'UNAUTHENTICATED' });
    },
  );
});
