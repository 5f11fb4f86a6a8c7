import { randomUUID } from 'node:crypto';
import { mkdtemp, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import type { DataSource } from 'typeorm';
import { vi } from 'vitest';
import type { AppDependencies } from '../../server/AppDependencies.js';
import { parseConfig, type Config } from '../../server/config/config.js';
import { createDataSource } from '../../server/createDataSource.js';
import { createLogger } from '../../server/logging/createLogger.js';
import { PasswordHasher } from '../../server/security/PasswordHasher.js';
import { ScreeningQueue } from '../../server/queues/ScreeningQueue.js';
import { createStorage } from '../../server/storage/createStorage.js';
import { TestClock } from './TestClock.js';

/** A secret that appears in no log and no answer; tests look for it. */
export const testJwtSecret = 'test-secret-0123456789-0123456789-abcdef';

export interface TestDependencies extends AppDependencies {
  clock: TestClock;
  queueName: string;
  release: () => Promise<void>;
}

function testServiceUrl(name: string): string {
  const url = process.env[name];
  if (!url) throw new Error(`${name} is not set. Run the tests with "npm test", which starts what they need.`);
  return url;
}

export function testConfig(storageDir: string, overrides: Partial<Config> = {}): Config {
  const parsed = parseConfig({
    NODE_ENV: 'test',
    // Names of their own: tests empty the database, which must never be one that somebody works with.
    DATABASE_URL: testServiceUrl('OVERFOLD_TEST_DATABASE_URL'),
    REDIS_URL: testServiceUrl('OVERFOLD_TEST_REDIS_URL'),
    SMTP_URL: 'smtp://127.0.0.1:9',
    JWT_SECRET: testJwtSecret,
    // The cheapest there is: the suite hashes often, and the cost has a test of its own.
    BCRYPT_COST: '4',
    LOG_LEVEL: process.env.LOG_LEVEL ?? 'silent',
    STORAGE_DIR: storageDir,
    DEMO_MAIL_DIR: path.join(storageDir, 'mail'),
  });
  return Object.freeze({ ...parsed, ...overrides });
}

async function truncateAll(dataSource: DataSource): Promise<void> {
  const tables = dataSource.entityMetadatas.map(({ tableName }) => `"${tableName}"`).join(', ');
  await dataSource.query(`truncate ${tables} cascade`);
}

/** Real PostgreSQL and Redis from the environment, an empty database, a queue and a folder of their own. */
export async function createTestDependencies(overrides: Partial<Config> = {}): Promise<TestDependencies> {
  const storageDir = await mkdtemp(path.join(tmpdir(), 'overfold-test-'));
  const config = testConfig(storageDir, overrides);
  const dataSource = await createDataSource(config.DATABASE_URL).initialize();
  await dataSource.runMigrations();
  await truncateAll(dataSource);
  const logger = createLogger(config, 'server');
  const queueName = `screening-${randomUUID()}`;
  const queue = new ScreeningQueue(config.REDIS_URL, logger, queueName);
  // The producer refuses at once while its connection is still being made; a test should not meet that moment.
  await vi.waitFor(() => queue.check(), { timeout: 10_000, interval: 20 });
  const clock = new TestClock();
  return {
    config,
    dataSource,
    logger,
    passwords: new PasswordHasher(config.BCRYPT_COST),
    storage: createStorage(config),
    queue,
    queueName,
    clock,
    version: '0.0.0-test',
    now: clock.now,
    clientDir: null,
    release: async () => {
      await queue.close();
      await dataSource.destroy();
      await rm(storageDir, { recursive: true, force: true });
    },
  };
}
