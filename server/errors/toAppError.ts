import { QueryFailedError } from 'typeorm';
import { AppError } from './AppError.js';
import { InsufficientStorageError } from './InsufficientStorageError.js';
import { InternalError } from './InternalError.js';
import { InvalidInputError } from './InvalidInputError.js';
import { TooLargeError } from './TooLargeError.js';
import { UnavailableError } from './UnavailableError.js';
import { UnsupportedMediaTypeError } from './UnsupportedMediaTypeError.js';

/** PostgreSQL: connection (08), resources (53), operator intervention (57, restart included), lock or statement time-out. */
const passingStates = /^(08|53|57|40)|^55P03$/;
/** A character that text or JSON columns can't hold. */
const unstorableCodes = new Set(['22021', '22P05']);
const networkCodes = new Set(['ECONNREFUSED', 'ECONNRESET', 'ETIMEDOUT', 'EPIPE', 'ENOTFOUND', 'EAI_AGAIN']);
const fullCodes = new Set(['ENOSPC', 'EDQUOT']);

function textOf(source: object, key: string): string | undefined {
  const value: unknown = Reflect.get(source, key);
  return typeof value === 'string' ? value : undefined;
}

function fromParser(type: string | undefined, status: number, cause: unknown): AppError | null {
  if (type === 'entity.too.large') {
    return new TooLargeError('BODY_TOO_LARGE', 'The request body is too large for this route.', { cause });
  }
  if (type === 'entity.parse.failed') {
    return new InvalidInputError('BAD_JSON', 'The body is not valid JSON.', { cause });
  }
  if (status === 415) return new UnsupportedMediaTypeError(undefined, undefined, { cause });
  if (status >= 400 && status < 500) {
    return new InvalidInputError('BAD_REQUEST', 'The request could not be read.', { cause });
  }
  return null;
}

/** The pool and the driver raise plain errors without a code when no connection can be had. */
const isConnectionFailure = (error: Error): boolean =>
  /^Connection terminated|timeout exceeded when trying to connect|^Client was closed|is not established|not queryable/.test(
    error.message,
  );

/** Gives every thrown thing its place. What is not known is a bug and says nothing to the outside. */
export function toAppError(thrown: unknown): AppError {
  if (thrown instanceof AppError) return thrown;
  if (!(thrown instanceof Error)) return new InternalError({ cause: thrown });
  const driverError: unknown = thrown instanceof QueryFailedError ? thrown.driverError : thrown;
  const code = driverError instanceof Error ? textOf(driverError, 'code') : undefined;
  if (code && fullCodes.has(code)) return new InsufficientStorageError(undefined, undefined, { cause: thrown });
  if (code && unstorableCodes.has(code)) {
    return new InvalidInputError('BAD_CHARACTER', 'A text holds a character that cannot be stored.', { cause: thrown });
  }
  if (
    (code && (networkCodes.has(code) || passingStates.test(code))) ||
    (driverError instanceof Error && isConnectionFailure(driverError))
  ) {
    return new UnavailableError(undefined, undefined, { cause: thrown });
  }
  const status: unknown = Reflect.get(thrown, 'status');
  if (typeof status === 'number') {
    const known = fromParser(textOf(thrown, 'type'), status, thrown);
    if (known) return known;
  }
  return new InternalError({ cause: thrown });
}
