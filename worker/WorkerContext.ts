import type { DataSource } from 'typeorm';
import type { Config } from '../server/config/config.js';
import type { Logger } from '../server/logging/createLogger.js';
import type { CaptureStorage } from '../server/storage/CaptureStorage.js';
import type { ScreeningPool } from './threads/ScreeningPool.js';

/** What a processor may use. */
export interface WorkerContext {
  config: Config;
  dataSource: DataSource;
  logger: Logger;
  storage: CaptureStorage;
  screeningPool: ScreeningPool;
}
