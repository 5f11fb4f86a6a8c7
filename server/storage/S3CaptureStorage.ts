import { randomUUID } from 'node:crypto';
import { createReadStream, createWriteStream } from 'node:fs';
import { mkdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Readable } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import {
  DeleteObjectCommand,
  GetObjectCommand,
  HeadBucketCommand,
  paginateListObjectsV2,
  S3Client,
} from '@aws-sdk/client-s3';
import { Upload } from '@aws-sdk/lib-storage';
import type { CaptureStorage } from './CaptureStorage.js';
import { isStorageKey } from './newStorageKey.js';
import { StoredFileMissingError } from './StoredFileMissingError.js';

export interface S3Settings {
  endpoint?: string;
  region: string;
  bucket: string;
  accessKeyId?: string;
  secretAccessKey?: string;
}

const isMissing = (error: unknown): boolean =>
  error instanceof Error && (error.name === 'NoSuchKey' || error.name === 'NotFound');

/** Files in an S3 bucket; the worker gets a temporary local copy, since several passes read the file. */
export class S3CaptureStorage implements CaptureStorage {
  readonly temporaryDir = join(tmpdir(), 'overfold-incoming');
  private readonly client: S3Client;
  private readonly bucket: string;

  constructor({ endpoint, region, bucket, accessKeyId, secretAccessKey }: S3Settings) {
    this.bucket = bucket;
    this.client = new S3Client({
      region,
      ...(endpoint ? { endpoint, forcePathStyle: true } : {}),
      ...(accessKeyId && secretAccessKey ? { credentials: { accessKeyId, secretAccessKey } } : {}),
    });
  }

  async save(key: string, temporaryPath: string): Promise<void> {
    const upload = new Upload({
      client: this.client,
      params: { Bucket: this.bucket, Key: key, Body: createReadStream(temporaryPath) },
    });
    await upload.done();
    await rm(temporaryPath, { force: true });
  }

  async openReadStream(key: string): Promise<Readable> {
    try {
      const { Body } = await this.client.send(new GetObjectCommand({ Bucket: this.bucket, Key: key }));
      // In Node the SDK's body is always a Readable; the union covers browsers.
      return Body as Readable;
    } catch (error) {
      if (isMissing(error)) throw new StoredFileMissingError(key, error);
      throw error;
    }
  }

  async withLocalFile<T>(key: string, use: (filePath: string) => Promise<T>): Promise<T> {
    await mkdir(this.temporaryDir, { recursive: true });
    const copy = join(this.temporaryDir, `copy-${randomUUID()}`);
    try {
      await pipeline(await this.openReadStream(key), createWriteStream(copy));
      return await use(copy);
    } finally {
      await rm(copy, { force: true });
    }
  }

  async remove(key: string): Promise<void> {
    await this.client.send(new DeleteObjectCommand({ Bucket: this.bucket, Key: key }));
  }

  async *listOlderThan(limit: Date): AsyncIterable<string> {
    for await (const page of paginateListObjectsV2({ client: this.client }, { Bucket: this.bucket })) {
      for (const { Key, LastModified } of page.Contents ?? []) {
        if (Key && LastModified && isStorageKey(Key) && LastModified < limit) yield Key;
      }
    }
  }

  async check(): Promise<void> {
    await this.client.send(new HeadBucketCommand({ Bucket: this.bucket }));
  }
}
