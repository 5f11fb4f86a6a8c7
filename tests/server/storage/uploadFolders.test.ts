import { spawnSync } from 'node:child_process';
import { mkdir, mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { uploadFolders } from '../../../server/storage/uploadFolders.js';

let folder: string;
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'overfold-uploads-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

/** Number of a process that has ended. */
const deadPid = (): number => spawnSync(process.execPath, ['-e', '']).pid;

describe('uploadFolders', () => {
  it('clears what a dead process of this machine left, and nothing else', async () => {
    const own = path.basename(await uploadFolders.create(folder));
    const dead = own.replace(`-${process.pid}-`, `-${deadPid()}-`);
    const elsewhere = `upload-other.machine-${deadPid()}-abc`;
    for (const name of [dead, elsewhere, 'notes']) await mkdir(path.join(folder, name));
    await uploadFolders.clearDead(folder);
    expect((await readdir(folder)).sort()).toEqual([own, elsewhere, 'notes'].sort());
  });

  it('makes the folder for uploads where there is none', async () => {
    await uploadFolders.clearDead(path.join(folder, 'new/incoming'));
    expect(await readdir(path.join(folder, 'new/incoming'))).toEqual([]);
  });
});
