import { existsSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { BcryptPool } from '../../server/security/BcryptPool.js';
import { PasswordHasher } from '../../server/security/PasswordHasher.js';

/** The compiled class: threads need compiled code. `npm test` builds it first. */
const compiled = new URL('../../dist/node/server/security/BcryptPool.js', import.meta.url);

let pool: BcryptPool;
beforeAll(async () => {
  if (!existsSync(compiled)) throw new Error('The build is missing. Run: npm run build:node');
  const built = (await import(compiled.href)) as { BcryptPool: new () => BcryptPool };
  pool = new built.BcryptPool();
});
afterAll(() => pool.close());

describe('BcryptPool', () => {
  it('makes hashes that the engine of this thread knows, and knows them itself', async () => {
    const hasher = new PasswordHasher(4, pool);
    const hash = await hasher.hash('amber-otter-ladder');
    expect(await hasher.matches('amber-otter-ladder', hash)).toBe(true);
    expect(await hasher.matches('another-password', hash)).toBe(false);
    expect(await new PasswordHasher(4).matches('amber-otter-ladder', hash)).toBe(true);
  });

  it('leaves the asking thread free while it works', async () => {
    let beats = 0;
    const timer = setInterval(() => beats++, 1);
    const startedMs = performance.now();
    await pool.hash('amber-otter-ladder', 12);
    clearInterval(timer);
    // bcrypt in the asking thread lets a timer through every 100 ms only.
    expect(beats).toBeGreaterThan(((performance.now() - startedMs) / 100) * 3);
  });

  it('turns work away when a minute of it is waiting, and goes on afterwards', async () => {
    const answers = await Promise.allSettled(Array.from({ length: 150 }, () => pool.hash('amber-otter-ladder', 4)));
    const refused = answers.filter(({ status }) => status === 'rejected') as PromiseRejectedResult[];
    expect(refused.length).toBeGreaterThan(0);
    for (const { reason } of refused) expect(reason).toMatchObject({ status: 503, code: 'UNAVAILABLE' });
    expect(await pool.hash('amber-otter-ladder', 4)).toMatch(/^\$2[aby]\$04\$/);
  });
});
