import { describe, expect, it } from 'vitest';
import { parseConfig } from '../../../server/config/config.js';

const complete = {
  DATABASE_URL: 'postgres://overfold@127.0.0.1/overfold',
  REDIS_URL: 'redis://127.0.0.1:6379',
  SMTP_URL: 'smtp://127.0.0.1:25',
  JWT_SECRET: 'x'.repeat(32),
};

describe('parseConfig', () => {
  it('fills in defaults and freezes the result', () => {
    const config = parseConfig(complete);
    expect(config).toMatchObject({ PORT: 4400, BCRYPT_COST: 12, TRUST_PROXY_HOPS: 0, OVERFOLD_DEMO: false });
    expect(config.publicUrl).toBe('http://127.0.0.1:4400');
    expect(Object.isFrozen(config)).toBe(true);
  });

  it('treats an empty variable like a missing one', () => {
    expect(parseConfig({ ...complete, PORT: '', OVERFOLD_DEMO: '' })).toMatchObject({
      PORT: 4400,
      OVERFOLD_DEMO: false,
    });
  });

  it('drops the slash at the end of the public address', () => {
    expect(parseConfig({ ...complete, PUBLIC_URL: 'https://overfold.example/' }).publicUrl).toBe(
      'https://overfold.example',
    );
  });

  it.each([
    ['JWT_SECRET', 'too-short'],
    ['PORT', '70000'],
    ['PORT', 'http'],
    ['DATABASE_URL', 'mysql://x'],
    ['REDIS_URL', '127.0.0.1:6379'],
    ['OVERFOLD_DEMO', 'yes'],
    ['TRUST_PROXY_HOPS', 'true'],
    ['BCRYPT_COST', '3'],
  ])('refuses %s=%s and names the variable', (key, value) => {
    expect(() => parseConfig({ ...complete, [key]: value })).toThrow(key);
  });

  it('names every missing variable at once', () => {
    expect(() => parseConfig({})).toThrow(/DATABASE_URL[\s\S]*REDIS_URL[\s\S]*SMTP_URL[\s\S]*JWT_SECRET/);
  });
});
