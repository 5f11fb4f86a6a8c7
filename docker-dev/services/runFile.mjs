import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

const fileOf = (stateDir) => join(stateDir, 'running.json');

function isAlive(pid) {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return error.code === 'EPERM';
  }
}

/** Who runs this installation now: { pid, port }, or null. */
export function readRunning(stateDir) {
  if (!existsSync(fileOf(stateDir))) return null;
  const running = JSON.parse(readFileSync(fileOf(stateDir), 'utf8'));
  return isAlive(running.pid) ? running : null;
}

export function writeRunning(stateDir, port) {
  mkdirSync(stateDir, { recursive: true });
  writeFileSync(fileOf(stateDir), JSON.stringify({ pid: process.pid, port }));
}

export function clearRunning(stateDir) {
  rmSync(fileOf(stateDir), { force: true });
}
