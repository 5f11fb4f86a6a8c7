import { mkdir, mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { text } from 'node:stream/consumers';
import { startFauxqs, type FauxqsServer } from 'fauxqs';
import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { CaptureStorage } from '../../../server/storage/CaptureStorage.js';
import { LocalCaptureStorage } from '../../../server/storage/LocalCaptureStorage.js';
import { newStorageKey } from '../../../server/storage/newStorageKey.js';
import { S3CaptureStorage } from '../../../server/storage/S3CaptureStorage.js';
import { StoredFileMissingError } from '../../../server/storage/StoredFileMissingError.js';

let folder: string;
let s3: FauxqsServer;

beforeAll(async () => {
  s3 = await startFauxqs({ port: 0, host: '127.0.0.1', logger: false });
  s3.createBucket('captures');
});
afterAll(() => s3.stop());
beforeEach(async () => {
  folder = await mkdtemp(path.join(tmpdir(), 'overfold-store-'));
});
afterEach(() => rm(folder, { recursive: true, force: true }));

const stores: [string, () => CaptureStorage][] = [
  ['a local folder', () => new LocalCaptureStorage(path.join(folder, 'store'))],
  [
    'an S3 bucket',
    () =>
      new S3CaptureStorage({
        endpoint: `http://127.0.0.1:${s3.port}`,
        region: 'eu-central-1',
        bucket: 'captures',
        accessKeyId: 'test',
        secretAccessKey: 'test',
      }),
  ],
];

describe.each(stores)('capture storage in %s', (_name, create) => {
  let storage: CaptureStorage;
  beforeEach(() => {
    storage = create();
  });

  const save = async (content: string | Buffer): Promise<string> => {
    const temporaryPath = path.join(folder, 'upload');
    await writeFile(temporaryPath, content);
    const key = newStorageKey();
    await storage.save(key, temporaryPath);
    return key;
  };

  it('gives back exactly the bytes it took, and keeps no temporary file', async () => {
    const bytes = Buffer.from(Array.from({ length: 100_000 }, (_, n) => (n * 7) % 256));
    const key = await save(bytes);
    const read = await storage.withLocalFile(key, (file) => readFile(file));
    expect(read.equals(bytes)).toBe(true);
    expect(await readdir(folder)).not.toContain('upload');
  });

  it('streams a file', async () => {
    const key = await save('t,a\n0,1\n');
    expect(await text(await storage.openReadStream(key))).toBe('t,a\n0,1\n');
  });

  it('keeps the local copy only while it is used, whether use ends well or not', async () => {
    const key = await save('content');
    let copy = '';
    await expect(
      storage.withLocalFile(key, (file) => {
        copy = file;
        return Promise.reject(new Error('unreadable'));
      }),
    ).rejects.toThrow('unreadable');
    expect(await storage.withLocalFile(key, (file) => readFile(file, 'utf8'))).toBe('content');
    if (storage instanceof S3CaptureStorage) await expect(readFile(copy)).rejects.toMatchObject({ code: 'ENOENT' });
  });

  it('says that a file is missing', async () => {
    await expect(storage.openReadStream(newStorageKey())).rejects.toBeInstanceOf(StoredFileMissingError);
    const use = storage.withLocalFile(newStorageKey(), () => Promise.resolve());
    await expect(use).rejects.toBeInstanceOf(StoredFileMissingError);
  });

  it('removes a file, and has nothing against removing it twice', async () => {
    const key = await save('content');
    await storage.remove(key);
    await storage.remove(key);
    await expect(storage.openReadStream(key)).rejects.toBeInstanceOf(StoredFileMissingError);
  });

  it('lists the keys of files older than a moment', async () => {
    const key = await save('content');
    const list = async (limit: Date): Promise<string[]> => {
      const keys = [];
      for await (const found of storage.listOlderThan(limit)) keys.push(found);
      return keys;
    };
    expect(await list(new Date(Date.now() + 60_000))).toContain(key);
    expect(await list(new Date(Date.now() - 60_000))).toEqual([]);
    await storage.remove(key);
  });

  it('can be written', async () => {
    await expect(storage.check()).resolves.toBeUndefined();
  });
});

describe('a store that is not usable', () => {
  it('is found out for a folder that cannot be made', async () => {
    await writeFile(path.join(folder, 'file'), '');
    await expect(new LocalCaptureStorage(path.join(folder, 'file')).check()).rejects.toThrow();
  });

  it('is found out for a bucket that does not exist', async () => {
    const settings = { endpoint: `http://127.0.0.1:${s3.port}`, region: 'eu-central-1', bucket: 'other' };
    const storage = new S3CaptureStorage({ ...settings, accessKeyId: 'test', secretAccessKey: 'test' });
    await expect(storage.check()).rejects.toThrow();
  });

  it.each(['../outside', '/etc/passwd', 'ab/../../outside'])('refuses the key %s in a folder', async (key) => {
    await mkdir(path.join(folder, 'store'), { recursive: true });
    await expect(new LocalCaptureStorage(path.join(folder, 'store')).openReadStream(key)).rejects.toThrow(/inside/);
  });
});
