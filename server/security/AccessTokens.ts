import { createSecretKey } from 'node:crypto';
import jwt from 'jsonwebtoken';
import { z } from 'zod';
import { UnauthenticatedError } from '../errors/index.js';

const issuer = 'overfold';
const audience = 'overfold-api';

const claimsSchema = z.object({
  type: z.literal('access'),
  sub: z.uuid(),
  sid: z.uuid(),
  exp: z.number(),
});

export interface AccessClaims {
  userId: string;
  sessionId: string;
  expiresAt: Date;
}

/** Short-lived proof of a session. The session's row has the last word; the token only names it. */
export class AccessTokens {
  // Made once: verifying with a string builds a key each time, at fifty times the cost.
  private readonly key;

  constructor(
    secret: string,
    private readonly lifetimeMinutes: number,
    private readonly now: () => Date,
  ) {
    this.key = createSecretKey(secret, 'utf8');
  }

  issue(userId: string, sessionId: string): { token: string; expiresAt: Date } {
    const issuedAtS = Math.floor(this.now().getTime() / 1000);
    const expiresAtS = issuedAtS + this.lifetimeMinutes * 60;
    const token = jwt.sign(
      { type: 'access', sub: userId, sid: sessionId, iss: issuer, aud: audience, iat: issuedAtS, exp: expiresAtS },
      this.key,
      { algorithm: 'HS256' },
    );
    return { token, expiresAt: new Date(expiresAtS * 1000) };
  }

  /** @throws UnauthenticatedError: `SESSION_EXPIRED` for a token that was good once, `UNAUTHENTICATED` for any other */
  verify(token: string): AccessClaims {
    let payload: unknown;
    try {
      payload = jwt.verify(token, this.key, {
        algorithms: ['HS256'],
        issuer,
        audience,
        clockTimestamp: Math.floor(this.now().getTime() / 1000),
      });
    } catch (error) {
      if (error instanceof jwt.TokenExpiredError) {
        throw new UnauthenticatedError('SESSION_EXPIRED', 'The session has expired. Renew it or sign in again.');
      }
      throw new UnauthenticatedError();
    }
    const claims = claimsSchema.safeParse(payload);
    if (!claims.success) throw new UnauthenticatedError();
    return {
      userId: claims.data.sub,
      sessionId: claims.data.sid,
      expiresAt: new Date(claims.data.exp * 1000),
    };
  }
}
