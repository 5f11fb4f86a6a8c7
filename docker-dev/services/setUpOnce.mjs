import { existsSync, mkdirSync, readFileSync, rmSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { setTimeout as pause } from 'node:timers/promises';
import { ensureBuild } from './build.mjs';
import { ensureNpmPackages } from './npmPackages.mjs';
import { identify, isStillThere } from './processIdentity.mjs';
import { projectDir } from './settings.mjs';

const lockDir = join(projectDir, '.overfold');
const unreadableLimitMs = 5_000;
const lockFile = join(lockDir, 'setup.lock');

function tryLock() {
  try {
    writeFileSync(lockFile, JSON.stringify(identify(process.pid)), { flag: 'wx' });
    return true;
  } catch (error) {
    if (error.code !== 'EEXIST') throw error;
    return false;
  }
}

function isHeld() {
  try {
    return isStillThere(JSON.parse(readFileSync(lockFile, 'utf8')));
  } catch {
    // Just released, or being written this very moment; a file that stays unreadable is what a crash left.
    return existsSync(lockFile) && Date.now() - statSync(lockFile).mtimeMs < unreadableLimitMs;
  }
}

/** Start and test command may run at once; packages and build must not be made by both at the same time. */
async function oneAtATime(work) {
  mkdirSync(lockDir, { recursive: true });
  while (!tryLock()) {
    if (!isHeld()) rmSync(lockFile, { force: true });
    await pause(300);
  }
  try {
    return await work();
  } finally {
    rmSync(lockFile, { force: true });
  }
}

export const setUpPackages = () => oneAtATime(ensureNpmPackages);
export const setUpBuild = () => oneAtATime(ensureBuild);
