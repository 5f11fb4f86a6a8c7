import { parseConfig } from '../config/config.js';
import { connectDatabase } from '../connectDatabase.js';
import { createLogger } from '../logging/createLogger.js';
import { ScreeningQueue } from '../queues/ScreeningQueue.js';
import { PasswordHasher } from '../security/PasswordHasher.js';
import { createStorage } from '../storage/createStorage.js';
import { DemoSeeder } from './DemoSeeder.js';

/** `npm start` runs it before the app; an installation that has been filled in is left as it is. */
async function seed(): Promise<void> {
  const config = parseConfig(process.env);
  if (!config.OVERFOLD_DEMO) throw new Error('Demo data belong into a demo installation only (OVERFOLD_DEMO=1).');
  const logger = createLogger({ LOG_LEVEL: 'warn' }, 'server');
  const dataSource = await connectDatabase(config, { poolSize: 4 });
  const queue = new ScreeningQueue(config.REDIS_URL, logger);
  try {
    const passwords = new PasswordHasher(config.BCRYPT_COST);
    await new DemoSeeder({ config, dataSource, logger, passwords, queue, storage: createStorage(config) }).run();
  } finally {
    await queue.close();
    await dataSource.destroy();
  }
}

seed().catch((error: unknown) => {
  process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
  process.exitCode = 1;
});
