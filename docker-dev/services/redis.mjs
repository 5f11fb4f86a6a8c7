import { spawn } from 'node:child_process';
import { closeSync, existsSync, mkdirSync, openSync, readFileSync, realpathSync } from 'node:fs';
import { createConnection } from 'node:net';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { findProgram } from './debianPackages.mjs';
import { identify, isStillThere, workingDirectory } from './processIdentity.mjs';

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

function lastLines(file) {
  return existsSync(file) ? readFileSync(file, 'utf8').trim().split('\n').slice(-5).join('\n') : '';
}

/**
 * Starts a private Redis on loopback: append-only file, and it keeps every key, as a queue must.
 * Resolves when it answers PING (the port opens earlier, while it is still loading).
 */
export async function startRedis({ dataDir, port }) {
  mkdirSync(dataDir, { recursive: true });
  const logFile = join(dataDir, 'redis.log');
  const log = openSync(logFile, 'a');
  const options = {
    port,
    bind: '127.0.0.1',
    dir: dataDir,
    appendonly: 'yes',
    appendfsync: 'everysec',
    'maxmemory-policy': 'noeviction',
    pidfile: join(dataDir, 'redis.pid'),
    daemonize: 'no',
  };
  const child = spawn(
    findProgram('redis-server'),
    Object.entries(options).flatMap(([name, value]) => [`--${name}`, String(value)]),
    { cwd: dataDir, stdio: ['ignore', log, log], detached: true },
  );
  closeSync(log);
  let isOver = false;
  child.once('error', () => (isOver = true));
  child.once('exit', () => (isOver = true));
  for (let tries = 0; tries < 300 && !isOver; tries += 1) {
    if ((await ask(port, 'PING')) === '+PONG') {
      child.unref();
      return { pid: child.pid, stop: () => stopRedis(dataDir) };
    }
    await pause(100);
  }
  throw new Error(`Redis did not start; its log is ${logFile}:\n${lastLines(logFile)}`);
}

/** The Redis that works in this folder, or null: another program may have got its number since. */
function findRedis(dataDir) {
  const pidFile = join(dataDir, 'redis.pid');
  if (!existsSync(pidFile)) return null;
  const redis = identify(Number(readFileSync(pidFile, 'utf8')));
  return redis && workingDirectory(redis.pid) === realpathSync(dataDir) ? redis : null;
}

/** Ends the Redis of this folder, and no other; it writes its data on SIGTERM. */
export async function stopRedis(dataDir) {
  const redis = findRedis(dataDir);
  if (!redis) return false;
  process.kill(redis.pid, 'SIGTERM');
  for (let tries = 0; tries < 200 && isStillThere(redis); tries += 1) await pause(50);
  return true;
}
