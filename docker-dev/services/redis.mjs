import { spawn } from 'node:child_process';
import { existsSync, mkdirSync, openSync, readFileSync } from 'node:fs';
import { createConnection } from 'node:net';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { findProgram } from './debianPackages.mjs';

/** One command in Redis's inline form; the first line of the answer, or null where nobody answers. */
function ask(port, command) {
  return new Promise((resolve) => {
    const socket = createConnection({ port, host: '127.0.0.1' });
    const finish = (answer) => {
      socket.destroy();
      resolve(answer);
    };
    socket.setTimeout(1000, () => finish(null));
    socket.once('connect', () => socket.write(`${command}\r\n`));
    socket.once('data', (data) => finish(data.toString().split('\r\n')[0]));
    socket.once('error', () => finish(null));
    socket.once('close', () => finish(null));
  });
}

/**
 * Starts a private Redis on loopback: append-only file, and it keeps every key, as a queue must.
 * Resolves when it answers PING (the port opens earlier, while it is still loading).
 */
export async function startRedis({ dataDir, port }) {
  mkdirSync(dataDir, { recursive: true });
  const log = openSync(join(dataDir, 'redis.log'), 'a');
  const child = spawn(
    findProgram('redis-server'),
    [
      '--port',
      String(port),
      '--bind',
      '127.0.0.1',
      '--dir',
      dataDir,
      '--appendonly',
      'yes',
      '--appendfsync',
      'everysec',
      '--maxmemory-policy',
      'noeviction',
      '--pidfile',
      join(dataDir, 'redis.pid'),
      '--daemonize',
      'no',
    ],
    { stdio: ['ignore', log, log], detached: true },
  );
  let exitCode = null;
  child.once('exit', (code) => {
    exitCode = code ?? 1;
  });
  for (let tries = 0; tries < 300; tries += 1) {
    if (exitCode !== null) break;
    if ((await ask(port, 'PING')) === '+PONG') {
      child.unref();
      return { pid: child.pid, stop: () => stopRedis(dataDir, port) };
    }
    await pause(100);
  }
  throw new Error(
    `Redis did not start; its log is ${join(dataDir, 'redis.log')}:\n${readFileSync(join(dataDir, 'redis.log'), 'utf8').split('\n').slice(-5).join('\n')}`,
  );
}

/** Ends the Redis of this folder, if it is the one that answers on the port. */
export async function stopRedis(dataDir, port) {
  if (!existsSync(join(dataDir, 'redis.pid'))) return false;
  await ask(port, 'SHUTDOWN SAVE');
  for (let tries = 0; tries < 100 && existsSync(join(dataDir, 'redis.pid')); tries += 1) await pause(100);
  return true;
}
