// npm run stop: ends what runs in this folder, also what a killed start left behind.
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { stopPostgres } from './services/postgres.mjs';
import { stopRedis } from './services/redis.mjs';
import { clearRunning, readRunning } from './services/runFile.mjs';
import { say } from './services/say.mjs';
import { readSettings } from './services/settings.mjs';

const { stateDir, redisPort } = readSettings();
const running = readRunning(stateDir);
if (running) {
  process.kill(running.pid, 'SIGTERM');
  for (let tries = 0; tries < 300 && readRunning(stateDir); tries += 1) await pause(100);
}
const hadRedis = await stopRedis(join(stateDir, 'redis'), redisPort);
const hadPostgres = stopPostgres(join(stateDir, 'postgres'));
clearRunning(stateDir);
say(running || hadRedis || hadPostgres ? 'stopped' : 'nothing was running');
