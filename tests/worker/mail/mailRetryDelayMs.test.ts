import { expect, it } from 'vitest';
import { mailRetryDelayMs } from '../../../worker/mail/mailRetryDelayMs.js';

it('doubles from 15 s and stays at an hour', () => {
  expect([1, 2, 3, 4].map(mailRetryDelayMs)).toEqual([15_000, 30_000, 60_000, 120_000]);
  expect(mailRetryDelayMs(20)).toBe(3_600_000);
});
