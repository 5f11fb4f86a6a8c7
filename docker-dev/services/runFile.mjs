import { existsSync, mkdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { identify, isStillThere } from './processIdentity.mjs';

const fileOf = (stateDir) => join(stateDir, 'running.json');

function read(stateDir) {
  return existsSync(fileOf(stateDir)) ? JSON.parse(readFileSync(fileOf(stateDir), 'utf8')) : null;
}

/** The start command that runs this installation now: { pid, startedAt, port }, or null. */
export function readRunning(stateDir) {
  const running = read(stateDir);
  return running && isStillThere(running.starter) ? { ...running.starter, port: running.port } : null;
}

/** The app's processes that still run, also after their start command was killed. */
export function readChildren(stateDir) {
  return (read(stateDir)?.children ?? []).filter(isStillThere);
}

export function writeRunning(stateDir, port) {
  mkdirSync(stateDir, { recursive: true });
  writeFileSync(fileOf(stateDir), JSON.stringify({ starter: identify(process.pid), port, children: [] }));
}

export function addChild(stateDir, pid) {
  const running = read(stateDir);
  const child = identify(pid);
  if (!running || !child) return;
  writeFileSync(fileOf(stateDir), JSON.stringify({ ...running, children: [...running.children, child] }));
}

export function clearRunning(stateDir) {
  rmSync(fileOf(stateDir), { force: true });
}
