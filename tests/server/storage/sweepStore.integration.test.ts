import { mkdir, readdir, writeFile } from 'node:fs/promises';
import path from 'node:path';
import { afterEach, beforeEach, describe, expect, it } from 'vitest';
import { newStorageKey } from '../../../server/storage/newStorageKey.js';
import { sweepStore } from '../../../server/storage/sweepStore.js';
import { buildBatch } from '../../support/factories/buildBatch.js';
import { buildCapture } from '../../support/factories/buildCapture.js';
import { buildProject } from '../../support/factories/buildProject.js';
import { createTestDependencies, type TestDependencies } from '../../support/testDependencies.js';

let deps: TestDependencies;
beforeEach(async () => {
  deps = await createTestDependencies();
});
afterEach(() => deps.release());

const put = async (key: string): Promise<void> => {
  const file = path.join(deps.config.STORAGE_DIR, key);
  await mkdir(path.dirname(file), { recursive: true });
  await writeFile(file, 'content');
};
const dayLater = (): Date => new Date(Date.now() + 25 * 60 * 60_000);
const sweep = (now: Date): Promise<number> => sweepStore(deps.dataSource, deps.storage, now);

describe('sweepStore', () => {
  it('removes files that belong to no capture once they are a day old, and keeps all others', async () => {
    const batch = await buildBatch(deps.dataSource, (await buildProject(deps.dataSource)).id);
    const kept = await buildCapture(deps.dataSource, batch);
    const orphan = newStorageKey();
    for (const key of [kept.storageKey, orphan, 'notes/readme.txt']) await put(key);
    expect(await sweep(new Date())).toBe(0);
    expect(await sweep(dayLater())).toBe(1);
    await expect(deps.storage.openReadStream(orphan)).rejects.toThrow(/missing/);
    (await deps.storage.openReadStream(kept.storageKey)).destroy();
    expect(await readdir(path.join(deps.config.STORAGE_DIR, 'notes'))).toEqual(['readme.txt']);
  });

  it('clears uploads that a killed process left half way', async () => {
    await mkdir(path.join(deps.storage.temporaryDir, 'upload-x'), { recursive: true });
    await writeFile(path.join(deps.storage.temporaryDir, 'upload-x/part'), 'half');
    await sweep(new Date());
    expect(await readdir(deps.storage.temporaryDir)).toEqual(['upload-x']);
    await sweep(dayLater());
    expect(await readdir(deps.storage.temporaryDir)).toEqual([]);
  });
});
