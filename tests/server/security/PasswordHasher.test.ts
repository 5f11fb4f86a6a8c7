import bcrypt from 'bcryptjs';
import { describe, expect, it } from 'vitest';
import { PasswordHasher } from '../../../server/security/PasswordHasher.js';

const hasher = new PasswordHasher(4);

describe('PasswordHasher', () => {
  it('recognises the password that it hashed, and no other', async () => {
    const hash = await hasher.hash('amber-otter-ladder');
    expect(await hasher.matches('amber-otter-ladder', hash)).toBe(true);
    expect(await hasher.matches('amber-otter-laddeR', hash)).toBe(false);
  });

  it('lets every byte beyond the 72nd count', async () => {
    const prefix = 'x'.repeat(72);
    const hash = await hasher.hash(`${prefix}one`);
    expect(await hasher.matches(`${prefix}one`, hash)).toBe(true);
    expect(await hasher.matches(`${prefix}two`, hash)).toBe(false);
    expect(await hasher.matches(prefix, hash)).toBe(false);
  });

  it('keeps characters apart that only look alike', async () => {
    const hash = await hasher.hash('Straße-messgerät-🔧');
    expect(await hasher.matches('Straße-messgerät-🔧', hash)).toBe(true);
    expect(await hasher.matches('Strasse-messgerät-🔧', hash)).toBe(false);
  });

  it('answers false without a hash, whatever the password', async () => {
    expect(await hasher.matches('no account has this password', null)).toBe(false);
  });

  it('takes as long for an unknown user as for a wrong password', async () => {
    const slower = new PasswordHasher(8);
    const hash = await slower.hash('amber-otter-ladder');
    const timesMs: Record<'known' | 'unknown', number[]> = { known: [], unknown: [] };
    const measure = async (kind: 'known' | 'unknown'): Promise<void> => {
      const startedMs = performance.now();
      await slower.matches('wrong-password', kind === 'known' ? hash : null);
      timesMs[kind].push(performance.now() - startedMs);
    };
    // Alternating, so that other work on the machine hits both alike.
    for (let i = 0; i < 30; i++) {
      await measure('known');
      await measure('unknown');
    }
    const median = (values: number[]): number => [...values].sort((a, b) => a - b)[values.length / 2] ?? NaN;
    const ratio = median(timesMs.unknown) / median(timesMs.known);
    expect(ratio).toBeGreaterThan(0.8);
    expect(ratio).toBeLessThan(1.2);
  });

  it('stores a hash of the cost that it was given', async () => {
    expect(bcrypt.getRounds(await new PasswordHasher(6).hash('amber-otter-ladder'))).toBe(6);
  });
});
