import type { Readable } from 'node:stream';

/** Where the uploaded files are. Keys are generated (`newStorageKey`), never made from a file's name. */
export interface CaptureStorage {
  /** Moves a finished temporary file into the store; when this resolves the bytes survive a power cut. */
  save(key: string, temporaryPath: string): Promise<void>;
  openReadStream(key: string): Promise<Readable>;
  /** Runs `use` with the path of a local copy, valid until the returned promise settles. */
  withLocalFile<T>(key: string, use: (filePath: string) => Promise<T>): Promise<T>;
  /** No error when there is no such file. */
  remove(key: string): Promise<void>;
  /** Keys of files last changed before `limit`. */
  listOlderThan(limit: Date): AsyncIterable<string>;
  /** @throws Error when the store can't be written */
  check(): Promise<void>;
  /** Folder for uploads in progress, in the same file system as a local store. */
  readonly temporaryDir: string;
}
