import { randomUUID } from 'node:crypto';
import { describe, expect, it } from 'vitest';
import { RenewalTokens } from '../../../server/security/RenewalTokens.js';

const tokens = new RenewalTokens('a-secret-of-more-than-32-characters-xyz');

describe('RenewalTokens', () => {
  it('starts every session with another token that names the session', () => {
    const sessionId = randomUUID();
    const first = tokens.first(sessionId);
    expect(tokens.first(sessionId)).not.toBe(first);
    expect(tokens.sessionIdOf(first)).toBe(sessionId);
  });

  it('gives two callers with the same token the same successor', () => {
    const sessionId = randomUUID();
    const first = tokens.first(sessionId);
    expect(tokens.next(sessionId, first)).toBe(tokens.next(sessionId, first));
    expect(tokens.next(sessionId, first)).not.toBe(first);
    expect(tokens.sessionIdOf(tokens.next(sessionId, first))).toBe(sessionId);
  });

  it('gives another successor under another secret', () => {
    const sessionId = randomUUID();
    const first = tokens.first(sessionId);
    const others = new RenewalTokens('another-secret-of-more-than-32-characters');
    expect(others.next(sessionId, first)).not.toBe(tokens.next(sessionId, first));
  });

  it.each(['', 'abc', randomUUID(), `${randomUUID()}.short`, `${randomUUID()}.${'a'.repeat(44)}`])(
    'knows no session for %j',
    (text) => {
      expect(tokens.sessionIdOf(text)).toBeNull();
    },
  );
});
