import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { say } from './say.mjs';
import { projectDir } from './settings.mjs';

/** Installs the npm packages when they are missing or the lock file has changed since. */
export function ensureNpmPackages() {
  const lockHash = createHash('sha256')
    .update(readFileSync(join(projectDir, 'package-lock.json')))
    .digest('hex');
  const marker = join(projectDir, 'node_modules', '.overfold-lock');
  if (existsSync(marker) && readFileSync(marker, 'utf8') === lockHash) return;
  say('installing npm packages');
  const result = spawnSync('npm', ['ci', '--no-audit', '--no-fund'], {
    cwd: projectDir,
    stdio: ['ignore', 'ignore', 'pipe'],
    encoding: 'utf8',
    // A production setting of the caller must not leave out what the build needs.
    env: { ...process.env, NODE_ENV: 'development' },
  });
  if (result.status !== 0) throw new Error(`npm ci failed:\n${result.stderr.trim()}`);
  writeFileSync(marker, lockHash);
}
