import { spawnSync } from 'node:child_process';
import { existsSync, readdirSync } from 'node:fs';
import { delimiter, join } from 'node:path';
import { say } from './say.mjs';

const postgresRoot = '/usr/lib/postgresql';

/** Folder of the newest installed PostgreSQL's programs; Debian keeps them out of PATH. */
export function findPostgresBin() {
  if (!existsSync(postgresRoot)) return null;
  const versions = readdirSync(postgresRoot)
    .filter((name) => existsSync(join(postgresRoot, name, 'bin', 'initdb')))
    .sort((a, b) => Number(b) - Number(a));
  return versions.length > 0 ? join(postgresRoot, versions[0], 'bin') : null;
}

/** Full path of a program in PATH or the usual system folders. */
export function findProgram(name) {
  const folders = [...(process.env.PATH ?? '').split(delimiter), '/usr/bin', '/usr/sbin', '/usr/local/bin'];
  return folders.map((folder) => join(folder, name)).find((path) => existsSync(path)) ?? null;
}

const isPresent = {
  postgresql: () => findPostgresBin() !== null,
  'redis-server': () => findProgram('redis-server') !== null,
  chromium: () => findProgram('chromium') !== null,
};

const isRoot = () => process.getuid?.() === 0;

function runApt(prefix, args) {
  const [program, ...rest] = [...prefix, 'apt-get', '-o', 'DPkg::Lock::Timeout=600', ...args];
  const result = spawnSync(program, rest, {
    stdio: ['ignore', 'ignore', 'pipe'],
    encoding: 'utf8',
    env: { ...process.env, DEBIAN_FRONTEND: 'noninteractive' },
  });
  return { isDone: result.status === 0, message: (result.stderr ?? '').trim().split('\n').slice(-3).join(' ') };
}

/**
 * Installs those Debian packages whose programs are missing. As root directly, else through sudo where that asks nothing.
 * @throws Error with the one command an administrator must run
 */
export function ensureDebianPackages(names) {
  const missing = names.filter((name) => !isPresent[name]());
  if (missing.length === 0) return;
  const command = `apt-get update && apt-get install -y --no-install-recommends ${missing.join(' ')}`;
  const canSudo =
    !isRoot() && findProgram('sudo') && spawnSync('sudo', ['-n', 'true'], { stdio: 'ignore' }).status === 0;
  if (!findProgram('apt-get') || !(isRoot() || canSudo)) {
    throw new Error(
      `These Debian packages are missing: ${missing.join(', ')}. Have an administrator run:\n  sudo sh -c '${command}'`,
    );
  }
  say(`installing Debian packages: ${missing.join(', ')}`);
  const prefix = isRoot() ? [] : ['sudo', '-n'];
  runApt(prefix, ['update']);
  const install = runApt(prefix, ['install', '-y', '--no-install-recommends', ...missing]);
  const still = missing.filter((name) => !isPresent[name]());
  if (!install.isDone || still.length > 0) {
    throw new Error(
      `Installing ${missing.join(', ')} failed: ${install.message}\nTry it by hand:\n  sudo sh -c '${command}'`,
    );
  }
}
