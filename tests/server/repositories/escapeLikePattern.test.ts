import { expect, it } from 'vitest';
import { escapeLikePattern } from '../../../server/repositories/escapeLikePattern.js';

it('makes the wildcards and the escape character literal', () => {
  expect(escapeLikePattern('50%_a\\b')).toBe('50\\%\\_a\\\\b');
  expect(escapeLikePattern("plain ' text")).toBe("plain ' text");
});
