import { randomUUID } from 'node:crypto';
import { createReadStream } from 'node:fs';
import { access, mkdir, open, readdir, rename, rm, stat, writeFile } from 'node:fs/promises';
import { dirname, join, resolve, sep } from 'node:path';
import type { Readable } from 'node:stream';
import type { CaptureStorage } from './CaptureStorage.js';
import { isStorageKey } from './newStorageKey.js';
import { StoredFileMissingError } from './StoredFileMissingError.js';

async function syncToDisk(path: string): Promise<void> {
  const handle = await open(path, 'r');
  try {
    await handle.sync();
  } finally {
    await handle.close();
  }
}

/** Files in a folder of this machine (or one it has mounted). */
export class LocalCaptureStorage implements CaptureStorage {
  readonly temporaryDir: string;
  private readonly rootDir: string;

  constructor(storageDir: string) {
    this.rootDir = resolve(storageDir);
    this.temporaryDir = join(this.rootDir, 'incoming');
  }

  async save(key: string, temporaryPath: string): Promise<void> {
    const target = this.pathOf(key);
    await mkdir(dirname(target), { recursive: true });
    await syncToDisk(temporaryPath);
    await rename(temporaryPath, target);
    // The name is only safe once the folder that holds it is.
    await syncToDisk(dirname(target));
  }

  async openReadStream(key: string): Promise<Readable> {
    const path = await this.existingPath(key);
    return createReadStream(path);
  }

  async withLocalFile<T>(key: string, use: (filePath: string) => Promise<T>): Promise<T> {
    return use(await this.existingPath(key));
  }

  async remove(key: string): Promise<void> {
    await rm(this.pathOf(key), { force: true });
  }

  async *listOlderThan(limit: Date): AsyncIterable<string> {
    await mkdir(this.rootDir, { recursive: true });
    for (const folder of await readdir(this.rootDir, { withFileTypes: true })) {
      if (!folder.isDirectory()) continue;
      for (const name of await readdir(join(this.rootDir, folder.name))) {
        const key = `${folder.name}/${name}`;
        if (!isStorageKey(key)) continue;
        const { ctime } = await stat(this.pathOf(key));
        if (ctime < limit) yield key;
      }
    }
  }

  async check(): Promise<void> {
    await mkdir(this.temporaryDir, { recursive: true });
    const probe = join(this.temporaryDir, `probe-${randomUUID()}`);
    await writeFile(probe, 'probe');
    await rm(probe);
  }

  private async existingPath(key: string): Promise<string> {
    const path = this.pathOf(key);
    try {
      await access(path);
    } catch (error) {
      throw new StoredFileMissingError(key, error);
    }
    return path;
  }

  private pathOf(key: string): string {
    const path = resolve(this.rootDir, key);
    if (!path.startsWith(this.rootDir + sep)) throw new Error('A storage key must stay inside the store.');
    return path;
  }
}
