import { readdir, rm, stat } from 'node:fs/promises';
import { join } from 'node:path';
import type { DataSource } from 'typeorm';
import type { CaptureStorage } from './CaptureStorage.js';

/** No upload takes this long: what is older and belongs to no row was left by a process that died. */
const oldestUploadMs = 24 * 60 * 60_000;
const keysPerQuery = 500;

/** Those of the keys that no capture points to. */
async function findOrphans(dataSource: DataSource, keys: string[]): Promise<string[]> {
  const rows = await dataSource.query<{ key: string }[]>(
    'SELECT key FROM unnest($1::text[]) AS key WHERE key NOT IN (SELECT storage_key FROM captures WHERE storage_key = ANY($1))',
    [keys],
  );
  return rows.map(({ key }) => key);
}

async function clearTemporary(folder: string, limit: Date): Promise<void> {
  const names = await readdir(folder).catch(() => []);
  for (const name of names) {
    const path = join(folder, name);
    const { mtime } = await stat(path);
    if (mtime < limit) await rm(path, { recursive: true, force: true });
  }
}

/**
 * Removes files that a killed process left: stored, but never committed as a row, and uploads broken off half way.
 * @returns the number of stored files removed
 */
export async function sweepStore(dataSource: DataSource, storage: CaptureStorage, now = new Date()): Promise<number> {
  const limit = new Date(now.getTime() - oldestUploadMs);
  let removed = 0;
  const removeOrphans = async (keys: string[]): Promise<void> => {
    for (const key of await findOrphans(dataSource, keys)) {
      await storage.remove(key);
      removed += 1;
    }
  };
  let keys: string[] = [];
  for await (const key of storage.listOlderThan(limit)) {
    keys.push(key);
    if (keys.length < keysPerQuery) continue;
    await removeOrphans(keys);
    keys = [];
  }
  if (keys.length > 0) await removeOrphans(keys);
  await clearTemporary(storage.temporaryDir, limit);
  return removed;
}
