import { describe, expect, it } from 'vitest';
import { InvalidInputError } from '../../../server/errors/index.js';
import { isCommonPassword, requireUncommonPassword } from '../../../server/security/requireUncommonPassword.js';

const account = { email: 'margarethe.olsen@marram.example', name: 'Margarethe Olsen' };

describe('isCommonPassword', () => {
  it.each([
    'password123',
    'PassWord123',
    '1234567890',
    'qwertyuiop',
    'aaaaaaaaaaaa',
    'abcabcabcabc',
    '4567890123',
    'margarethe.olsen@marram.example',
    'margarethe.olsen',
    'Margarethe Olsen',
    'margarethe.olsen2026!',
  ])('takes %j for common', (password) => {
    expect(isCommonPassword(password, account)).toBe(true);
  });

  it.each(['amber-otter-ladder-19', 'kT9#vq2!Lm', 'drei kleine Wellen', '振動計測の記録帳と鉛筆'])(
    'takes %j for uncommon',
    (password) => {
      expect(isCommonPassword(password, account)).toBe(false);
    },
  );

  it('decides about a long text at once', () => {
    const startedMs = performance.now();
    isCommonPassword('a'.repeat(50_000) + 'b', account);
    expect(performance.now() - startedMs).toBeLessThan(200);
  });
});

describe('requireUncommonPassword', () => {
  it('lets an uncommon password pass', () => {
    expect(() => requireUncommonPassword('amber-otter-ladder-19', account, 'body.password')).not.toThrow();
  });

  it('throws PASSWORD_TOO_COMMON with the place of the value', () => {
    let thrown: unknown;
    try {
      requireUncommonPassword('password123', account, 'body.password');
    } catch (error) {
      thrown = error;
    }
    expect(thrown).toBeInstanceOf(InvalidInputError);
    expect(thrown).toMatchObject({ code: 'PASSWORD_TOO_COMMON', status: 400, details: [{ path: 'body.password' }] });
  });
});
