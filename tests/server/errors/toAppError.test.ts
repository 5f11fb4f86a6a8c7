import { QueryFailedError } from 'typeorm';
import { describe, expect, it } from 'vitest';
import { ConflictError, toAppError } from '../../../server/errors/index.js';

const withFields = (message: string, fields: object): Error => Object.assign(new Error(message), fields);
const failedQuery = (code: string): QueryFailedError =>
  new QueryFailedError('select secret_column', [], withFields('driver says something internal', { code }));

describe('toAppError', () => {
  it('passes an error of ours through', () => {
    const error = new ConflictError('LAST_ADMIN', 'No.');
    expect(toAppError(error)).toBe(error);
  });

  const table: [string, unknown, number, string][] = [
    ['a full disk', withFields('no space', { code: 'ENOSPC' }), 507, 'STORAGE_FULL'],
    ['a refused connection', withFields('refused', { code: 'ECONNREFUSED' }), 503, 'UNAVAILABLE'],
    ['a database that shuts down', failedQuery('57P01'), 503, 'UNAVAILABLE'],
    ['a statement that took too long', failedQuery('57014'), 503, 'UNAVAILABLE'],
    ['a database out of connections', failedQuery('53300'), 503, 'UNAVAILABLE'],
    ['a database out of disk', failedQuery('53100'), 503, 'UNAVAILABLE'],
    ['a pool without a free connection', new Error('timeout exceeded when trying to connect'), 503, 'UNAVAILABLE'],
    ['a body that is too large', withFields('x', { type: 'entity.too.large', status: 413 }), 413, 'BODY_TOO_LARGE'],
    ['a body that is no JSON', withFields('x', { type: 'entity.parse.failed', status: 400 }), 400, 'BAD_JSON'],
    [
      'an unknown charset',
      withFields('x', { type: 'charset.unsupported', status: 415 }),
      415,
      'UNSUPPORTED_MEDIA_TYPE',
    ],
    ['a character that the database refuses', failedQuery('22021'), 400, 'BAD_CHARACTER'],
    ['a broken address', withFields('x', { status: 400 }), 400, 'BAD_REQUEST'],
    ['a wrong query of ours', failedQuery('42703'), 500, 'INTERNAL'],
    ['a programming error', new TypeError('x is undefined'), 500, 'INTERNAL'],
    ['a thrown text', 'oops', 500, 'INTERNAL'],
    ['nothing', undefined, 500, 'INTERNAL'],
  ];
  it.each(table)('answers %s', (_name, thrown, status, code) => {
    expect(toAppError(thrown)).toMatchObject({ status, code });
  });

  it('says nothing of the inside, and keeps it for the log', () => {
    const thrown = failedQuery('42703');
    const error = toAppError(thrown);
    expect(error.message).not.toMatch(/secret_column|internal/);
    expect(error.cause).toBe(thrown);
  });
});
