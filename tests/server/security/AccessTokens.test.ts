import { createSign, generateKeyPairSync, randomUUID } from 'node:crypto';
import jwt from 'jsonwebtoken';
import { describe, expect, it } from 'vitest';
import { UnauthenticatedError } from '../../../server/errors/index.js';
import { AccessTokens } from '../../../server/security/AccessTokens.js';

const secret = 'a-secret-of-more-than-32-characters-xyz';
const now = new Date('2026-03-01T12:00:00Z');
const nowS = now.getTime() / 1000;
const tokens = new AccessTokens(secret, 30, () => now);
const userId = randomUUID();
const sessionId = randomUUID();
const goodClaims = {
  type: 'access',
  sub: userId,
  sid: sessionId,
  iss: 'overfold',
  aud: 'overfold-api',
  iat: nowS,
  exp: nowS + 60,
};
const sign = (claims: object, key: string = secret, options: jwt.SignOptions = {}): string =>
  // Through JSON, so that a claim set to undefined is one that is missing.
  jwt.sign(JSON.parse(JSON.stringify(claims)) as object, key, { algorithm: 'HS256', ...options });
const encode = (value: object): string => Buffer.from(JSON.stringify(value)).toString('base64url');

function codeOf(token: string): string {
  try {
    tokens.verify(token);
    return 'accepted';
  } catch (error) {
    if (error instanceof UnauthenticatedError) return error.code;
    throw error;
  }
}

describe('AccessTokens', () => {
  it('names user, session and end of a token that it issued', () => {
    const { token, expiresAt } = tokens.issue(userId, sessionId);
    expect(tokens.verify(token)).toEqual({ userId, sessionId, expiresAt });
    expect(expiresAt.toISOString()).toBe('2026-03-01T12:30:00.000Z');
  });

  it('accepts the claims that the refusals below are made from', () => {
    expect(codeOf(sign(goodClaims))).toBe('accepted');
  });

  it('answers SESSION_EXPIRED for its own token after its end', () => {
    expect(codeOf(sign({ ...goodClaims, exp: nowS - 1 }))).toBe('SESSION_EXPIRED');
  });

  const [, payload = '', signature = ''] = sign(goodClaims).split('.');
  const { publicKey, privateKey } = generateKeyPairSync('rsa', { modulusLength: 2048 });
  const publicPem = publicKey.export({ type: 'spki', format: 'pem' }).toString();
  const rsaHead = `${encode({ alg: 'RS256', typ: 'JWT' })}.${encode(goodClaims)}`;

  const forged: Record<string, string> = {
    'algorithm none': `${encode({ alg: 'none', typ: 'JWT' })}.${payload}.`,
    'algorithm NONE with a signature': `${encode({ alg: 'NONE', typ: 'JWT' })}.${payload}.${signature}`,
    'a stripped signature': `${encode({ alg: 'HS256', typ: 'JWT' })}.${payload}.`,
    'an edited payload': `${encode({ alg: 'HS256', typ: 'JWT' })}.${encode({ ...goodClaims, sub: randomUUID() })}.${signature}`,
    'another secret': sign(goodClaims, 'another-secret-of-more-than-32-characters'),
    'another algorithm of the family': sign(goodClaims, secret, { algorithm: 'HS512' }),
    'HS256 signed with a public key': sign(goodClaims, publicPem, { allowInsecureKeySizes: true }),
    'RS256 signed with a key of the caller': `${rsaHead}.${createSign('RSA-SHA256').update(rsaHead).sign(privateKey, 'base64url')}`,
    'a key brought along in the header': sign(goodClaims, 'brought-along-key-of-more-than-32-characters', {
      header: { alg: 'HS256', kid: '../../dev/null', jku: 'https://evil.example/keys' },
    }),
    'another issuer': sign({ ...goodClaims, iss: 'elsewhere' }),
    'another audience': sign({ ...goodClaims, aud: 'elsewhere' }),
    'the type of an invitation': sign({ ...goodClaims, type: 'invitation' }),
    'no type': sign({ ...goodClaims, type: undefined }),
    'a subject that is no id': sign({ ...goodClaims, sub: "' or 1=1 --" }),
    'no end': sign({ ...goodClaims, exp: undefined }),
    'a beginning in the future': sign({ ...goodClaims, nbf: nowS + 600 }),
    'no token at all': 'not-a-token',
    'an empty text': '',
  };
  it.each(Object.entries(forged))('answers UNAUTHENTICATED for %s', (_name, token) => {
    expect(codeOf(token)).toBe('UNAUTHENTICATED');
  });
});
