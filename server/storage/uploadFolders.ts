import { mkdir, mkdtemp, readdir, rm } from 'node:fs/promises';
import { hostname } from 'node:os';
import { join } from 'node:path';

const host = hostname().replaceAll(/[^\w.]/g, '_');

function isAlive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    // EPERM: there is such a process, only not ours to signal.
    return error instanceof Error && 'code' in error && error.code === 'EPERM';
  }
}

/** Folders of uploads in progress carry machine and process, so that it shows whose they are. */
export const uploadFolders = {
  async create(temporaryDir: string): Promise<string> {
    await mkdir(temporaryDir, { recursive: true });
    return mkdtemp(join(temporaryDir, `upload-${host}-${process.pid}-`));
  },

  /** Removes what killed processes of this machine have left. Those of other machines stay for the sweep. */
  async clearDead(temporaryDir: string): Promise<void> {
    await mkdir(temporaryDir, { recursive: true });
    for (const name of await readdir(temporaryDir)) {
      const [, owner, pid] = /^upload-([\w.]+)-(\d+)-/.exec(name) ?? [];
      if (owner !== host || isAlive(Number(pid))) continue;
      await rm(join(temporaryDir, name), { recursive: true, force: true });
    }
  },
};
