import { spawnSync } from 'node:child_process';
import { existsSync, readFileSync, rmSync } from 'node:fs';
import { join } from 'node:path';
import { findPostgresBin } from './debianPackages.mjs';
import { findDataDir, prepareDataDir } from './postgresDataDir.mjs';

const superuser = 'overfold';

/** PostgreSQL refuses to run as root: then its packaged user runs it. */
function runAsServerUser(program, args) {
  const isRoot = process.getuid?.() === 0;
  const [command, ...rest] = isRoot ? ['runuser', '-u', 'postgres', '--', program, ...args] : [program, ...args];
  // Standard output ignored: the started server would hold a pipe open for ever.
  return spawnSync(command, rest, {
    cwd: '/',
    stdio: ['ignore', 'ignore', 'pipe'],
    encoding: 'utf8',
    timeout: 120_000,
  });
}

function check(result, what, logFile) {
  if (result.status === 0) return;
  const log = logFile && existsSync(logFile) ? readFileSync(logFile, 'utf8').split('\n').slice(-6).join('\n') : '';
  throw new Error(`${what} failed: ${(result.stderr ?? result.error?.message ?? '').trim()}\n${log}`.trim());
}

function makeCluster(dataDir) {
  const options = ['-U', superuser, '-A', 'trust', '-E', 'UTF8', '--locale=C.UTF-8', '--no-sync'];
  const made = runAsServerUser(join(findPostgresBin(), 'initdb'), ['-D', dataDir, ...options]);
  if (made.status !== 0) rmSync(dataDir, { recursive: true, force: true });
  check(made, 'Making the PostgreSQL cluster');
}

/** Program of the very version that made the data: another one refuses them. */
function findControl(dataDir) {
  const version = readFileSync(join(dataDir, 'PG_VERSION'), 'utf8').trim();
  const control = `/usr/lib/postgresql/${version}/bin/pg_ctl`;
  if (existsSync(control)) return control;
  throw new Error(
    `The data in ${dataDir} were made by PostgreSQL ${version}, which is no longer installed. Install postgresql-${version}, or start afresh with: npm run reset -- --yes`,
  );
}

/** Options that trade safety for speed; for tests only. */
const throwAwayOptions = '-c fsync=off -c synchronous_commit=off -c full_page_writes=off';

/**
 * Starts the private cluster of a state folder on loopback, made on first use. `trust` is for a cluster that only this
 * machine can reach.
 * @returns stop function; `immediate` ends without a checkpoint
 */
export function startPostgres({ stateDir, port, isThrowAway = false }) {
  const dataDir = prepareDataDir(stateDir);
  const logFile = join(dataDir, 'server.log');
  if (!existsSync(join(dataDir, 'PG_VERSION'))) makeCluster(dataDir);
  const control = findControl(dataDir);
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
export function stopPostgres(stateDir) {
  const dataDir = findDataDir(stateDir);
  if (!existsSync(join(dataDir, 'postmaster.pid'))) return false;
  return runAsServerUser(findControl(dataDir), ['-w', '-D', dataDir, '-m', 'fast', 'stop']).status === 0;
}

/** Deletes the cluster of a state folder, wherever it lives. */
export function removePostgresData(stateDir) {
  rmSync(findDataDir(stateDir), { recursive: true, force: true });
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
  const known = run(`SELECT 1 FROM pg_database WHERE datname = '${name}'`);
  check(known, 'Asking PostgreSQL for its databases');
  if (known.stdout.trim() !== '1') check(run(`CREATE DATABASE ${name}`), `Making the database ${name}`);
}
