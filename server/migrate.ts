import { parseConfig } from './config/config.js';
import { createDataSource } from './createDataSource.js';

/** `npm run db:migrate`: brings the database to the present schema. */
async function migrate(): Promise<void> {
  const { DATABASE_URL } = parseConfig(process.env);
  const dataSource = createDataSource(DATABASE_URL, { poolSize: 2 });
  await dataSource.initialize();
  try {
    const ran = await dataSource.runMigrations({ transaction: 'each' });
    console.log(ran.length === 0 ? 'The database is up to date.' : `Ran: ${ran.map(({ name }) => name).join(', ')}`);
  } finally {
    await dataSource.destroy();
  }
}

migrate().catch((error: unknown) => {
  console.error(error instanceof Error ? error.message : error);
  process.exitCode = 1;
});
