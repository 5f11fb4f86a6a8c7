import { spawnSync } from 'node:child_process';
import { chownSync, existsSync, mkdirSync, readFileSync, rmSync } from 'node:fs';
import { dirname, join } from 'node:path';
import { findPostgresBin } from './debianPackages.mjs';

const superuser = 'overfold';

/** PostgreSQL refuses to run as root: then its packaged user runs it. */
function runAsServerUser(program, args) {
  const isRoot = process.getuid?.() === 0;
  const [command, ...rest] = isRoot ? ['runuser', '-u', 'postgres', '--', program, ...args] : [program, ...args];
  // Without stdio ignored the started server would hold the pipe open for ever.
  return spawnSync(command, rest, {
    cwd: '/',
    stdio: ['ignore', 'ignore', 'pipe'],
    encoding: 'utf8',
    timeout: 120_000,
  });
}

function idsOf(user) {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith(`${user}:`));
  if (!line) throw new Error(`The user ${user} of the package postgresql is missing. Reinstall postgresql.`);
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

/** Makes the data folder so that the server's user can reach and own it. */
function prepareDataDir(dataDir) {
  mkdirSync(dataDir, { recursive: true, mode: 0o700 });
  if (process.getuid?.() !== 0) return;
  const { uid, gid } = idsOf('postgres');
  chownSync(dataDir, uid, gid);
  if (runAsServerUser('/usr/bin/test', ['-w', dataDir]).status !== 0) {
    throw new Error(
      `PostgreSQL's user "postgres" can't enter ${dirname(dataDir)}. Move the project to a folder that others may enter (for instance below /opt or /srv), or run the command as an ordinary user.`,
    );
  }
}

function check(result, what, logFile) {
  if (result.status === 0) return;
  const log = logFile && existsSync(logFile) ? readFileSync(logFile, 'utf8').split('\n').slice(-6).join('\n') : '';
  throw new Error(`${what} failed: ${(result.stderr ?? '').trim()}\n${log}`.trim());
}

/** Options that trade safety for speed; for tests only. */
const throwAwayOptions = '-c fsync=off -c synchronous_commit=off -c full_page_writes=off';

/**
 * Starts a private cluster on loopback, made on first use. `trust` is for a cluster only this machine can reach.
 * @returns stop function; `immediate` ends without a checkpoint
 */
export function startPostgres({ dataDir, port, isThrowAway = false }) {
  const bin = findPostgresBin();
  const logFile = join(dataDir, 'server.log');
  prepareDataDir(dataDir);
  if (!existsSync(join(dataDir, 'PG_VERSION'))) {
    const made = runAsServerUser(join(bin, 'initdb'), [
      '-D',
      dataDir,
      '-U',
      superuser,
      '-A',
      'trust',
      '-E',
      'UTF8',
      '--locale=C.UTF-8',
      '--no-sync',
    ]);
    if (made.status !== 0) rmSync(dataDir, { recursive: true, force: true });
    check(made, 'Making the PostgreSQL cluster');
  }
  const version = readFileSync(join(dataDir, 'PG_VERSION'), 'utf8').trim();
  if (!bin.includes(`/${version}/`) && !existsSync(`/usr/lib/postgresql/${version}/bin/pg_ctl`)) {
    throw new Error(
      `The data in ${dataDir} were made by PostgreSQL ${version}, which is no longer installed. Install postgresql-${version}, or start afresh with: npm run reset -- --yes`,
    );
  }
  const control = bin.includes(`/${version}/`) ? join(bin, 'pg_ctl') : `/usr/lib/postgresql/${version}/bin/pg_ctl`;
  const options = `-p ${port} -c listen_addresses=127.0.0.1 -c unix_socket_directories='' -c max_connections=120 ${isThrowAway ? throwAwayOptions : ''}`;
  check(
    runAsServerUser(control, ['-w', '-t', '60', '-D', dataDir, '-l', logFile, '-o', options, 'start']),
    'Starting PostgreSQL',
    logFile,
  );
  return {
    stop: (mode = 'fast') => runAsServerUser(control, ['-w', '-D', dataDir, '-m', mode, 'stop']),
  };
}

/** Ends a cluster that an earlier run left behind; nothing happens where none runs. */
export function stopPostgres(dataDir) {
  if (!existsSync(join(dataDir, 'postmaster.pid'))) return false;
  return (
    runAsServerUser(join(findPostgresBin() ?? '', 'pg_ctl'), ['-w', '-D', dataDir, '-m', 'fast', 'stop']).status === 0
  );
}

/** Makes a database that is not there yet. */
export function ensureDatabase({ port, name }) {
  const psql = join(findPostgresBin(), 'psql');
  const run = (sql) =>
    spawnSync(
      psql,
      ['-X', '-At', '-h', '127.0.0.1', '-p', String(port), '-U', superuser, '-d', 'postgres', '-c', sql],
      { encoding: 'utf8' },
    );
  if (run(`SELECT 1 FROM pg_database WHERE datname = '${name}'`).stdout.trim() === '1') return;
  check(run(`CREATE DATABASE ${name}`), `Making the database ${name}`);
}
