import type { DataSource } from 'typeorm';
import type { Config } from './config/config.js';
import { createDataSource } from './createDataSource.js';

/** @throws Error that says what to do when the database can't be reached */
export function connectDatabase(
  { DATABASE_URL }: Pick<Config, 'DATABASE_URL'>,
  options: { poolSize?: number } = {},
): Promise<DataSource> {
  return createDataSource(DATABASE_URL, options)
    .initialize()
    .catch((error: unknown) => {
      const reason = error instanceof Error ? error.message || ('code' in error && String(error.code)) : String(error);
      throw new Error(`The database cannot be reached (${reason}). Is PostgreSQL running, and is DATABASE_URL right?`, {
        cause: error,
      });
    });
}
