import type { Logger } from 'typeorm';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { buildMatrixFixture, sendMatrixRow, type MatrixUsers } from '../support/buildMatrixFixture.js';
import { createTestApp, type TestApp } from '../support/testApp.js';
import { authorizationMatrix, type MatrixFixture } from './authorizationMatrix.js';

/** Asking for the session included: more than this, and a list begins to ask for each of its rows. */
const mostStatements = 5;

let app: TestApp;
let users: MatrixUsers;
let fixture: MatrixFixture;
let statements: string[] = [];

const counter = {
  logQuery: (query: string) => statements.push(query),
  logQueryError: () => undefined,
  logQuerySlow: () => undefined,
  logSchemaBuild: () => undefined,
  logMigration: () => undefined,
  log: () => undefined,
} as Logger;

beforeAll(async () => {
  app = await createTestApp();
  ({ users, fixture } = await buildMatrixFixture(app.deps));
  app.deps.dataSource.setOptions({ logging: ['query'], logger: counter });
});
afterAll(() => app.close());

const reads = authorizationMatrix.filter(({ method, expected }) => method === 'get' && expected.reviewer === 200);

it.each(reads.map((row) => [row.path, row] as const))('GET %s needs few statements', async (_path, row) => {
  const client = await app.as(users.reviewer);
  statements = [];
  expect((await sendMatrixRow(client, row, fixture)).status).toBe(200);
  expect(statements.length).toBeLessThanOrEqual(mostStatements);
  if (row.expected.nobody === 401) expect(statements.length).toBeGreaterThan(0);
});

it('covers every read of a member', () => {
  expect(reads.length).toBeGreaterThan(10);
});
