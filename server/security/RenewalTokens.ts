import { createHmac, hkdfSync } from 'node:crypto';
import { randomSecret } from './secretTokens.js';

const pattern = /^([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})\.[\w-]{43}$/;

/**
 * Renewal tokens of a session form a chain: each follows from the one before by a keyed hash.
 * Two tabs that renew with the same token at once so get the same successor, and neither invalidates the other's.
 * The session's id in front makes an old link of the chain recognisable as such, which ends the session.
 */
export class RenewalTokens {
  private readonly key: Buffer;

  constructor(secret: string) {
    this.key = Buffer.from(hkdfSync('sha256', secret, '', 'overfold renewal token', 32));
  }

  first(sessionId: string): string {
    return `${sessionId}.${randomSecret()}`;
  }

  next(sessionId: string, token: string): string {
    return `${sessionId}.${createHmac('sha256', this.key).update(token).digest('base64url')}`;
  }

  /** The session a token speaks for, or null when it is none of ours. */
  sessionIdOf(token: string): string | null {
    return pattern.exec(token)?.[1] ?? null;
  }
}
