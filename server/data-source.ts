import { createDataSource } from './createDataSource.js';

/** For the TypeORM command line only; the app builds its own from the parsed configuration. */
export const dataSource = createDataSource(process.env.DATABASE_URL ?? 'postgres://overfold@127.0.0.1:4401/overfold');
