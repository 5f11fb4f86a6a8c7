// npm run stop: ends what runs in this folder, also what a killed start left behind.
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { stopPostgres } from './services/postgres.mjs';
import { signalGroup } from './services/Processes.mjs';
import { stopRedis } from './services/redis.mjs';
import { clearRunning, readChildren, readRunning } from './services/runFile.mjs';
import { say } from './services/say.mjs';
import { readSettings } from './services/settings.mjs';

const stopLimitMs = 60_000;
const orphanGraceMs = 15_000;

async function waitUntil(isDone, limitMs) {
  for (let waitedMs = 0; waitedMs < limitMs && !isDone(); waitedMs += 100) await pause(100);
}

const { stateDir } = readSettings();
const running = readRunning(stateDir);
if (running) {
  process.kill(running.pid, 'SIGTERM');
  await waitUntil(() => !readRunning(stateDir), stopLimitMs);
}
const orphans = readChildren(stateDir);
for (const { pid } of orphans) signalGroup(pid, 'SIGTERM');
await waitUntil(() => readChildren(stateDir).length === 0, orphanGraceMs);
for (const { pid } of readChildren(stateDir)) signalGroup(pid, 'SIGKILL');
const hadRedis = await stopRedis(join(stateDir, 'redis'));
const hadPostgres = stopPostgres(stateDir);
if (!readRunning(stateDir)) clearRunning(stateDir);
say(running || orphans.length > 0 || hadRedis || hadPostgres ? 'stopped' : 'nothing was running');
