/** A row points to a file that the store doesn't hold. */
export class StoredFileMissingError extends Error {
  readonly key: string;

  constructor(key: string, cause?: unknown) {
    super('The stored file is missing.', { cause });
    this.name = 'StoredFileMissingError';
    this.key = key;
  }
}
