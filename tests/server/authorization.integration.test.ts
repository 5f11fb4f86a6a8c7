import { randomUUID } from 'node:crypto';
import type { Test } from 'supertest';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { buildMatrixFixture, sendMatrixRow, type MatrixUsers } from '../support/buildMatrixFixture.js';
import { errorOf } from '../support/errorOf.js';
import { expressRoutes } from '../support/expressRoutes.js';
import { createTestApp, type TestApp, type TestClient } from '../support/testApp.js';
import { askers, authorizationMatrix, type Asker, type MatrixFixture, type MatrixRow } from './authorizationMatrix.js';

let app: TestApp;
let users: MatrixUsers;
let fixture: MatrixFixture;

beforeAll(async () => {
  app = await createTestApp({ config: { SIGN_IN_ATTEMPTS_PER_15_MIN: 10_000 } });
});
afterAll(() => app.close());

beforeEach(async () => {
  await app.deps.dataSource.query('truncate users, projects, mail_messages cascade');
  ({ users, fixture } = await buildMatrixFixture(app.deps));
});

const clientOf = (asker: Asker): Promise<TestClient> | TestClient =>
  asker === 'nobody' ? app.anonymous : app.as(users[asker]);

const send = (client: TestClient, row: MatrixRow): Test => sendMatrixRow(client, row, fixture);
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
