import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { say } from './say.mjs';
import { projectDir } from './settings.mjs';

const readLock = (...path) => JSON.parse(readFileSync(join(projectDir, ...path), 'utf8')).packages;

/** npm leaves a list of what it really installed; it must hold what the lock file asks for. */
function isUpToDate() {
  if (!existsSync(join(projectDir, 'node_modules', '.package-lock.json'))) return false;
  const installed = readLock('node_modules', '.package-lock.json');
  return Object.entries(readLock('package-lock.json')).every(
    ([path, wanted]) =>
      path === '' ||
      // Left out where they are for another platform.
      (wanted.optional && !installed[path]) ||
      installed[path]?.version === wanted.version,
  );
}

/** Installs the npm packages when they are missing or are not those of the lock file. */
export function ensureNpmPackages() {
  if (isUpToDate()) return;
  say('installing npm packages (about a minute)');
  const result = spawnSync('npm', ['ci', '--no-audit', '--no-fund'], {
    cwd: projectDir,
    stdio: ['ignore', 'ignore', 'pipe'],
    encoding: 'utf8',
    // A production setting of the caller must not leave out what the build needs.
    env: { ...process.env, NODE_ENV: 'development' },
  });
  if (result.status !== 0) throw new Error(`npm ci failed:\n${result.stderr.trim()}`);
}
