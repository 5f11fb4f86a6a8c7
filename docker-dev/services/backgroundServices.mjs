import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { ensureDatabase, removePostgresData, startPostgres } from './postgres.mjs';
import { startRedis } from './redis.mjs';

/** Starts the private PostgreSQL and Redis of a state folder; `stop` ends both. */
export async function startBackgroundServices({
  stateDir,
  postgresPort,
  redisPort,
  isThrowAway = false,
  database = 'overfold',
}) {
  mkdirSync(stateDir, { recursive: true });
  const postgres = startPostgres({ stateDir, port: postgresPort, isThrowAway });
  try {
    ensureDatabase({ port: postgresPort, name: database });
    const redis = await startRedis({ dataDir: join(stateDir, 'redis'), port: redisPort });
    return {
      stop: async () => {
        await redis.stop();
        postgres.stop(isThrowAway ? 'immediate' : 'fast');
        if (isThrowAway) removePostgresData(stateDir);
      },
    };
  } catch (error) {
    postgres.stop();
    throw error;
  }
}
