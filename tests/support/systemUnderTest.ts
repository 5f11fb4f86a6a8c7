import { randomBytes } from 'node:crypto';
import { mkdtemp, readdir, readFile, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { Redis } from 'ioredis';
import { simpleParser, type ParsedMail } from 'mailparser';
import { Client } from 'pg';
import type { DataSource } from 'typeorm';
import { parseConfig } from '../../server/config/config.js';
import { createDataSource } from '../../server/createDataSource.js';
import { DemoSeeder } from '../../server/demo/DemoSeeder.js';
import type { DemoProject } from '../../server/demo/demoProjects.js';
import { createLogger } from '../../server/logging/createLogger.js';
import { ScreeningQueue } from '../../server/queues/ScreeningQueue.js';
import { PasswordHasher } from '../../server/security/PasswordHasher.js';
import { createStorage } from '../../server/storage/createStorage.js';
import { AppProcess } from './AppProcess.js';
import { freePort } from './freePort.js';
import { waitUntil } from './waitUntil.js';

export interface SystemUnderTest {
  url: string;
  dataSource: DataSource;
  startWorker: () => AppProcess;
  mails: () => Promise<ParsedMail[]>;
  /** Output of all processes, for the message of a failed test. */
  logs: () => string;
  stop: () => Promise<void>;
}

function serviceUrl(name: string): string {
  const url = process.env[name];
  if (!url) throw new Error(`${name} is not set. Run the tests with "npm test", which starts what they need.`);
  return url;
}

async function onServer(sql: string): Promise<void> {
  const client = new Client({ connectionString: serviceUrl('OVERFOLD_TEST_DATABASE_URL') });
  await client.connect();
  await client.query(sql).finally(() => client.end());
}

/** Redis has numbered databases; the one for real processes is emptied before each system. */
async function emptyRedis(): Promise<string> {
  const url = `${serviceUrl('OVERFOLD_TEST_REDIS_URL')}/7`;
  const redis = new Redis(url);
  await redis.flushdb();
  await redis.quit();
  return url;
}

/** Short intervals, so that a test needs no patience; everything else as installed. */
async function environment(folder: string, database: string, extra: Record<string, string>) {
  const [port, smtpPort] = [await freePort(), await freePort()];
  const databaseUrl = new URL(serviceUrl('OVERFOLD_TEST_DATABASE_URL'));
  databaseUrl.pathname = `/${database}`;
  return {
    ...process.env,
    NODE_ENV: 'production',
    PORT: String(port),
    PUBLIC_URL: `http://127.0.0.1:${port}`,
    DATABASE_URL: databaseUrl.href,
    REDIS_URL: await emptyRedis(),
    SMTP_URL: `smtp://127.0.0.1:${smtpPort}`,
    JWT_SECRET: randomBytes(32).toString('hex'),
    BCRYPT_COST: '4',
    STORAGE_DIR: path.join(folder, 'captures'),
    DEMO_MAIL_DIR: path.join(folder, 'mail'),
    OVERFOLD_DEMO: '1',
    JOB_LOCK_MS: '2000',
    RECONCILE_INTERVAL_MS: '500',
    MAIL_INTERVAL_MS: '200',
    SMTP_PORT: String(smtpPort),
    ...extra,
  };
}

async function fill(env: NodeJS.ProcessEnv, dataSource: DataSource, projects: readonly DemoProject[]): Promise<void> {
  const config = parseConfig(env);
  const logger = createLogger({ LOG_LEVEL: 'error' }, 'server');
  const queue = new ScreeningQueue(config.REDIS_URL, logger);
  const passwords = new PasswordHasher(config.BCRYPT_COST);
  const storage = createStorage(config);
  await new DemoSeeder({ config, dataSource, logger, passwords, queue, storage }, projects).run();
  await queue.close();
}

/** The product as installed: built server and worker and the mail catcher as processes, filled with these projects. */
export async function startSystem(
  projects: readonly DemoProject[],
  { hasWorker = true, env: extra = {} }: { hasWorker?: boolean; env?: Record<string, string> } = {},
): Promise<SystemUnderTest> {
  const folder = await mkdtemp(path.join(tmpdir(), 'overfold-system-'));
  const database = `system_${randomBytes(6).toString('hex')}`;
  await onServer(`CREATE DATABASE ${database}`);
  const env = await environment(folder, database, extra);
  const dataSource = await createDataSource(env.DATABASE_URL, { poolSize: 3 }).initialize();
  await dataSource.runMigrations();
  await fill(env, dataSource, projects);

  const processes: AppProcess[] = [];
  const start = (name: string, ...args: string[]): AppProcess => {
    const started = new AppProcess(name, args, env);
    processes.push(started);
    return started;
  };
  const startWorker = (): AppProcess => start('worker', 'dist/node/worker/main.js');
  const logs = (): string => processes.map(({ log }) => log).join('\n');
  const stop = async (): Promise<void> => {
    await Promise.all(processes.map((started) => started.stop()));
    await dataSource.destroy();
    await onServer(`DROP DATABASE IF EXISTS ${database} WITH (FORCE)`);
    await rm(folder, { recursive: true, force: true });
  };
  const mails = async (): Promise<ParsedMail[]> => {
    const names = await readdir(env.DEMO_MAIL_DIR).catch(() => []);
    const whole = names.filter((name) => name.endsWith('.eml')).sort();
    return Promise.all(whole.map(async (name) => simpleParser(await readFile(path.join(env.DEMO_MAIL_DIR, name)))));
  };

  try {
    start('smtp', 'docker-dev/services/smtpFake.mjs', env.SMTP_PORT, env.DEMO_MAIL_DIR);
    const server = start('server', 'dist/node/server/main.js');
    if (hasWorker) startWorker();
    await waitUntil('the server answers', async () => {
      if (!server.isRunning) throw new Error(`The server ended by itself.\n${logs()}`);
      const answer = await fetch(`${env.PUBLIC_URL}/api/v1/settings`).catch(() => null);
      return answer?.ok === true;
    });
  } catch (error) {
    await stop();
    throw error;
  }
  return { url: env.PUBLIC_URL, dataSource, startWorker, mails, logs, stop };
}
