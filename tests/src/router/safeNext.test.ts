import { describe, expect, it } from 'vitest';
import { safeNext } from '@/router/safeNext';

describe('safeNext', () => {
  it('keeps a path of this site with its query', () => {
    expect(safeNext('/batches/7?page=2')).toBe('/batches/7?page=2');
  });

  it.each([
    '//elsewhere.example',
    '/\\elsewhere.example',
    'https://elsewhere.example',
    '/sign-in?next=/',
    undefined,
    ['/a'],
  ])('goes to the start instead of %s', (next) => expect(safeNext(next)).toBe('/'));
});
