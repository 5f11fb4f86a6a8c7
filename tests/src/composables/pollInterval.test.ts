import { describe, expect, it } from 'vitest';
import { pollInterval } from '@/composables/pollInterval';

describe('pollInterval', () => {
  it('asks again after a second while things change', () => expect(pollInterval(0)).toBe(1000));

  it('waits longer the longer nothing changed, up to 15 seconds', () => {
    expect(pollInterval(3)).toBeGreaterThan(pollInterval(2));
    expect(pollInterval(100)).toBe(15_000);
  });
});
