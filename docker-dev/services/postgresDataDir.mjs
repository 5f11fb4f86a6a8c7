import { spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { chmodSync, chownSync, existsSync, mkdirSync, readFileSync, statSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { say } from './say.mjs';

/** Home of PostgreSQL's own user on Debian. */
const packagedHome = '/var/lib/postgresql';

const isRoot = () => process.getuid?.() === 0;

function idsOf(user) {
  const line = readFileSync('/etc/passwd', 'utf8')
    .split('\n')
    .find((entry) => entry.startsWith(`${user}:`));
  if (!line) throw new Error(`The user ${user} of the package postgresql is missing. Reinstall postgresql.`);
  const [, , uid, gid] = line.split(':');
  return { uid: Number(uid), gid: Number(gid) };
}

function makeOwned(folder) {
  mkdirSync(folder, { recursive: true, mode: 0o700 });
  const { uid, gid } = idsOf('postgres');
  chownSync(folder, uid, gid);
}

const canReach = (folder) =>
  spawnSync('runuser', ['-u', 'postgres', '--', '/usr/bin/test', '-w', folder], { cwd: '/', stdio: 'ignore' })
    .status === 0;

const noteOf = (stateDir) => join(stateDir, 'postgres-folder.txt');

/** Where the cluster of a state folder lives, without making anything. */
export function findDataDir(stateDir) {
  return existsSync(noteOf(stateDir)) ? readFileSync(noteOf(stateDir), 'utf8').trim() : join(stateDir, 'postgres');
}

/**
 * Makes the cluster's folder. PostgreSQL never runs as root; started by root it runs as its packaged user, who can't
 * enter a project below a private folder (root's home, a private temporary folder). Then the cluster goes to that
 * user's home, and a note in the state folder says so.
 */
export function prepareDataDir(stateDir) {
  const dataDir = findDataDir(stateDir);
  if (!isRoot()) {
    mkdirSync(dataDir, { recursive: true, mode: 0o700 });
    return dataDir;
  }
  // A strict umask would close our own folder to the server's user; passing through is enough.
  chmodSync(stateDir, (statSync(stateDir).mode & 0o777) | 0o011);
  makeOwned(dataDir);
  if (canReach(dataDir)) return dataDir;
  const elsewhere = join(packagedHome, `overfold-${createHash('sha256').update(stateDir).digest('hex').slice(0, 12)}`);
  makeOwned(elsewhere);
  if (!canReach(elsewhere)) {
    throw new Error(
      `PostgreSQL's user "postgres" can enter neither ${dataDir} nor ${elsewhere}. Move the project to a folder that others may enter (for instance below /opt or /srv), or run the command as an ordinary user.`,
    );
  }
  writeFileSync(noteOf(stateDir), `${elsewhere}\n`);
  say(`this folder is closed to PostgreSQL's user, so its data go to ${elsewhere}`);
  return elsewhere;
}
