import type { DataSource } from 'typeorm';
import type { Config } from './config/config.js';
import type { Logger } from './logging/createLogger.js';
import type { ScreeningQueue } from './queues/ScreeningQueue.js';
import type { PasswordHasher } from './security/PasswordHasher.js';
import type { CaptureStorage } from './storage/CaptureStorage.js';

/** Everything the app needs from outside, so that tests and the demo can bring their own. */
export interface AppDependencies {
  config: Config;
  dataSource: DataSource;
  logger: Logger;
  passwords: PasswordHasher;
  storage: CaptureStorage;
  queue: ScreeningQueue;
  /** Version of the product, as in package.json. */
  version: string;
  /** The clock; tests bring their own. */
  now: () => Date;
  /** Folder of the built client; null serves the API only. */
  clientDir: string | null;
}
