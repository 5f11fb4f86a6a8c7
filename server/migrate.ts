import { parseConfig } from './config/config.js';
import { connectDatabase } from './connectDatabase.js';

/** `npm run db:migrate`: brings the database to the present schema. */
async function migrate(): Promise<void> {
  const dataSource = await connectDatabase(parseConfig(process.env), { poolSize: 2 });
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
