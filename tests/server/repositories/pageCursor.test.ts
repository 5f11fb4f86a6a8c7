import { describe, expect, it } from 'vitest';
import { InvalidInputError } from '../../../server/errors/index.js';
import { cutPage, pageCursor, type CursorKey } from '../../../server/repositories/pageCursor.js';

const id = '3f0e8f0a-6b52-4a37-9d3b-0c9c3e4f5a61';

describe('pageCursor', () => {
  it.each<[CursorKey, string]>([
    ['time', '2026-11-30 10:00:00.123456+00'],
    ['time', '2026-11-30 10:00:00+05:30'],
    ['number', '0.9700000000000001'],
    ['number', '-1'],
    ['number', '1e-07'],
    ['text', 'ünïcode "name"/a.wav'],
  ])('gives back a %s key exactly: %s', (kind, key) => {
    expect(pageCursor.decode(pageCursor.encode('newest', { key, id }), 'newest', kind)).toEqual({ key, id });
  });

  it('is nothing where there is none', () => {
    expect(pageCursor.decode(undefined, 'newest', 'time')).toBeNull();
  });

  it.each<[string, CursorKey, string]>([
    ['of another order', 'time', pageCursor.encode('oldest', { key: '2026-11-30 10:00:00+00', id })],
    ['with a key of another kind', 'time', pageCursor.encode('newest', { key: '0.5', id })],
    ['with an id that is none', 'number', pageCursor.encode('newest', { key: '0.5', id: "1' or '1'='1" })],
    ['with SQL for a number', 'number', pageCursor.encode('newest', { key: '1; select 1', id })],
    ['that is no JSON', 'text', 'AAAA'],
    ['with more in it', 'number', Buffer.from(JSON.stringify(['newest', '1', id, 'x'])).toString('base64url')],
  ])('refuses one %s', (_what, kind, cursor) => {
    expect(() => pageCursor.decode(cursor, 'newest', kind)).toThrow(InvalidInputError);
  });
});

describe('cutPage', () => {
  const rows = (count: number) => Array.from({ length: count }, (_, n) => ({ id, key: String(n) }));

  it('has a next cursor exactly when a row was read beyond the page', () => {
    expect(cutPage(rows(3), 3, 'newest')).toEqual({ items: rows(3), nextCursor: null });
    const page = cutPage(rows(4), 3, 'newest');
    expect(page.items).toHaveLength(3);
    expect(pageCursor.decode(page.nextCursor ?? '', 'newest', 'number')).toEqual({ key: '2', id });
  });
});
