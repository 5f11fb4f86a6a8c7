import { randomBytes } from 'node:crypto';
import { Client } from 'pg';
import { afterAll, beforeAll } from 'vitest';

/**
 * Gives every test file an empty database of its own beside the one that `npm test` names, so that a file which fails
 * half way leaves nothing to the next one.
 */
const serverUrl = process.env.OVERFOLD_TEST_DATABASE_URL;
if (!serverUrl || !process.env.OVERFOLD_TEST_REDIS_URL) {
  throw new Error('These tests need services. Run them with: npm test -- FILE');
}
const database = `test_${randomBytes(6).toString('hex')}`;

async function onServer(sql: string): Promise<void> {
  const client = new Client({ connectionString: serverUrl });
  await client.connect();
  await client.query(sql).finally(() => client.end());
}

beforeAll(async () => {
  await onServer(`CREATE DATABASE ${database}`);
  const url = new URL(serverUrl);
  url.pathname = `/${database}`;
  process.env.OVERFOLD_TEST_DATABASE_URL = url.href;
});

afterAll(async () => {
  process.env.OVERFOLD_TEST_DATABASE_URL = serverUrl;
  await onServer(`DROP DATABASE IF EXISTS ${database} WITH (FORCE)`);
});
