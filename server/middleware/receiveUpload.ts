import { createHash, randomUUID } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { rm } from 'node:fs/promises';
import path from 'node:path';
import { Transform } from 'node:stream';
import { pipeline } from 'node:stream/promises';
import type { Request, Response } from 'express';
import multer, { MulterError, type StorageEngine } from 'multer';
import {
  InvalidInputError,
  TooLargeError,
  toAppError,
  UnsupportedMediaTypeError,
  type AppError,
} from '../errors/index.js';
import { uploadFolders } from '../storage/uploadFolders.js';

/** Enough to recognise a format by; nothing more of a file is ever held in memory. */
const firstBytesLimit = 64 * 1024;
/** Sheets of a whole request as JSON. */
const fieldBytesLimit = 1024 * 1024;
const fieldLimit = 4;

export interface UploadLimits {
  maxFileBytes: number;
  maxFiles: number;
}

export interface ReceivedFile {
  /** As the client sent it, folders included. Not to be trusted. */
  rawName: string;
  temporaryPath: string;
  sizeBytes: number;
  sha256: string;
  firstBytes: Uint8Array;
}

export interface ReceivedUpload {
  files: ReceivedFile[];
  fields: ReadonlyMap<string, string>;
}

/** Writes a file part to disk while hashing it. */
function hashingStorage(folder: string, received: ReceivedFile[]): StorageEngine {
  return {
    _handleFile(_req, file, done) {
      const temporaryPath = path.join(folder, randomUUID());
      const hash = createHash('sha256');
      const head: Buffer[] = [];
      let sizeBytes = 0;
      const observe = new Transform({
        transform(chunk: Buffer, _encoding, next) {
          hash.update(chunk);
          if (sizeBytes < firstBytesLimit) head.push(chunk.subarray(0, firstBytesLimit - sizeBytes));
          sizeBytes += chunk.length;
          next(null, chunk);
        },
      });
      pipeline(file.stream, observe, createWriteStream(temporaryPath, { flags: 'wx' })).then(
        () => {
          const firstBytes = Buffer.concat(head);
          received.push({
            rawName: file.originalname,
            temporaryPath,
            sizeBytes,
            sha256: hash.digest('hex'),
            firstBytes,
          });
          done(null, { path: temporaryPath, size: sizeBytes });
        },
        (error: unknown) => done(error),
      );
    },
    // The folder goes as a whole when the request has ended, whichever way it ends.
    _removeFile(_req, _file, done) {
      done(null);
    },
  };
}

function explain(error: MulterError, { maxFileBytes, maxFiles }: UploadLimits): AppError {
  const cause = { cause: error };
  switch (error.code) {
    case 'LIMIT_FILE_SIZE':
      return new TooLargeError(
        'FILE_TOO_LARGE',
        `A file may hold at most ${maxFileBytes} bytes. Send it split.`,
        cause,
      );
    case 'LIMIT_FILE_COUNT':
    case 'LIMIT_PART_COUNT':
      return new TooLargeError('TOO_MANY_FILES', `Send at most ${maxFiles} files in one request.`, cause);
    case 'LIMIT_FIELD_VALUE':
      return new TooLargeError('FIELD_TOO_LARGE', `A text field may hold at most ${fieldBytesLimit} bytes.`, cause);
    case 'LIMIT_UNEXPECTED_FILE':
      return new InvalidInputError(
        'UNEXPECTED_FILE',
        `Send files in the field "files", at most ${maxFiles} in one request.`,
        cause,
      );
    default:
      return new InvalidInputError('BAD_UPLOAD', `The form could not be read: ${error.message}.`, cause);
  }
}

function toUploadError(error: unknown, limits: UploadLimits): AppError {
  if (error instanceof MulterError) return explain(error, limits);
  const known = toAppError(error);
  // The parser raises plain errors for a cut or malformed body; ours from disk carry a code and are known.
  if (known.kind !== 'bug' || (error instanceof Error && 'code' in error)) return known;
  return new InvalidInputError('BAD_UPLOAD', 'The form was cut off or is malformed. Send it again.', { cause: error });
}

/**
 * Reads a multipart request: files in the field `files` go to a folder of their own, hashed on the way, text fields stay
 * in memory. To be called only after the asker was found entitled. The folder is gone when `use` has ended.
 * @throws TooLargeError, InvalidInputError, UnsupportedMediaTypeError, InsufficientStorageError
 */
export async function receiveUpload<T>(
  request: Request,
  response: Response,
  temporaryDir: string,
  limits: UploadLimits,
  use: (upload: ReceivedUpload) => Promise<T>,
): Promise<T> {
  if (!request.is('multipart/form-data')) {
    throw new UnsupportedMediaTypeError('UNSUPPORTED_MEDIA_TYPE', 'Send the files as multipart/form-data.');
  }
  const folder = await uploadFolders.create(temporaryDir);
  try {
    const files: ReceivedFile[] = [];
    const read = multer({
      storage: hashingStorage(folder, files),
      preservePath: true,
      defParamCharset: 'utf8',
      limits: {
        fileSize: limits.maxFileBytes,
        files: limits.maxFiles,
        fields: fieldLimit,
        parts: limits.maxFiles + fieldLimit,
        fieldSize: fieldBytesLimit,
        fieldNameSize: 100,
        headerPairs: 50,
        fieldNestingDepth: 0,
      },
    }).array('files', limits.maxFiles);
    await new Promise<void>((resolve, reject) => {
      read(request, response, (error: unknown) => (error ? reject(toUploadError(error, limits)) : resolve()));
    });
    // Parts end in any order; the client's own order makes the answer readable.
    const order = new Map(((request.files ?? []) as Express.Multer.File[]).map((file, index) => [file.path, index]));
    files.sort((a, b) => (order.get(a.temporaryPath) ?? 0) - (order.get(b.temporaryPath) ?? 0));
    const fields = new Map(
      Object.entries((request.body ?? {}) as Record<string, unknown>).filter(
        (entry): entry is [string, string] => typeof entry[1] === 'string',
      ),
    );
    return await use({ files, fields });
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
