import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { ensureDatabase, startPostgres } from './postgres.mjs';
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
  const postgres = startPostgres({ dataDir: join(stateDir, 'postgres'), port: postgresPort, isThrowAway });
  try {
    ensureDatabase({ port: postgresPort, name: database });
    const redis = await startRedis({ dataDir: join(stateDir, 'redis'), port: redisPort });
    return {
      stop: async () => {
        await redis.stop();
        postgres.stop(isThrowAway ? 'immediate' : 'fast');
      },
    };
  } catch (error) {
    postgres.stop();
    throw error;
  }
}
