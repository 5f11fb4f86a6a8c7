import { describe, expect, it } from 'vitest';
import { formatBytes } from '@/utils/formatBytes';
import { formatDuration } from '@/utils/formatDuration';
import { formatFrequency } from '@/utils/formatFrequency';

describe('formatFrequency', () => {
  it.each([
    [310.5, '310.5 Hz'],
    [9999, '9999 Hz'],
    [24_000, '24 kHz'],
    [1_500_000, '1.5 MHz'],
    [null, '–'],
  ])('writes %s as %s', (value, text) => expect(formatFrequency(value)).toBe(text));
});

describe('formatDuration', () => {
  it.each([
    [12.4, '12.4 s'],
    [185, '3 min 05 s'],
    [3720, '1 h 02 min'],
    [undefined, '–'],
  ])('writes %s as %s', (value, text) => expect(formatDuration(value)).toBe(text));
});

describe('formatBytes', () => {
  it.each([
    [0, '0 B'],
    [1023, '1023 B'],
    [1024, '1 KiB'],
    [1.4 * 1024 * 1024, '1.4 MiB'],
  ])('writes %s as %s', (value, text) => expect(formatBytes(value)).toBe(text));
});
