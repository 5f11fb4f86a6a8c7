import { createServer, type Server } from 'node:http';
import path from 'node:path';
import { createApp } from './app.js';
import { parseConfig, type Config } from './config/config.js';
import { connectDatabase } from './connectDatabase.js';
import { createLogger, type Logger } from './logging/createLogger.js';
import { ScreeningQueue } from './queues/ScreeningQueue.js';
import { readVersion } from './readVersion.js';
import { BcryptPool } from './security/BcryptPool.js';
import { PasswordHasher } from './security/PasswordHasher.js';
import { createStorage } from './storage/createStorage.js';
import { uploadFolders } from './storage/uploadFolders.js';

const headersTimeoutMs = 20_000;
/** A large capture over a slow line; the reader itself enforces size and number. */
const requestTimeoutMs = 6 * 3_600_000;
const forceQuitMs = 10_000;

function listen(server: Server, config: Config): Promise<void> {
  return new Promise((resolve, reject) => {
    server.once('error', (error: NodeJS.ErrnoException) => {
      const isTaken = error.code === 'EADDRINUSE';
      reject(isTaken ? new Error(`Port ${config.PORT} is taken. Set PORT to a free one.`, { cause: error }) : error);
    });
    server.listen(config.PORT, config.HOST, resolve);
  });
}

/** Requests under way end, new ones are refused, then the parts are let go; a limit keeps a stuck one from holding us. */
function stopOnSignal(server: Server, logger: Logger, release: () => Promise<void>): void {
  let isStopping = false;
  const stop = (signal: string): void => {
    if (isStopping) return;
    isStopping = true;
    logger.info({ signal }, 'stopping');
    setTimeout(() => {
      logger.error('could not stop in time');
      process.exit(1);
    }, forceQuitMs).unref();
    server.close(() => {
      release()
        .catch((error: unknown) => logger.error({ err: error }, 'stopping failed'))
        .finally(() => process.exit(0));
    });
    // Kept-alive connections count as open until they are idle.
    setInterval(() => server.closeIdleConnections(), 200).unref();
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
}

async function main(): Promise<void> {
  const config = parseConfig(process.env);
  const logger = createLogger(config, 'server');
  // Last resort: what nobody caught leaves the process in an unknown state, so it ends and is started again.
  process.on('uncaughtException', (error) => {
    logger.fatal({ err: error }, 'uncaught exception');
    process.exit(1);
  });
  process.on('unhandledRejection', (reason) => {
    logger.fatal({ err: reason }, 'unhandled rejection');
    process.exit(1);
  });

  const dataSource = await connectDatabase(config);
  if (await dataSource.showMigrations()) {
    throw new Error('The database lacks the newest tables. Run: npm run db:migrate');
  }
  const queue = new ScreeningQueue(config.REDIS_URL, logger);
  // Under the development loader hashing stays in this thread.
  const bcryptPool = import.meta.url.endsWith('.js') ? new BcryptPool() : undefined;
  const passwords = new PasswordHasher(config.BCRYPT_COST, bcryptPool);
  await passwords.prepare();
  const storage = createStorage(config);
  await uploadFolders.clearDead(storage.temporaryDir);
  const app = createApp({
    config,
    dataSource,
    logger,
    passwords,
    storage,
    queue,
    version: readVersion(),
    now: () => new Date(),
    clientDir: path.resolve('dist/client'),
  });
  const server = createServer({ headersTimeout: headersTimeoutMs, requestTimeout: requestTimeoutMs }, app);
  await listen(server, config);
  stopOnSignal(server, logger, async () => {
    await bcryptPool?.close();
    await queue.close();
    await dataSource.destroy();
  });
  logger.info({ port: config.PORT, publicUrl: config.publicUrl }, 'listening');
}

main().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exit(1);
});
