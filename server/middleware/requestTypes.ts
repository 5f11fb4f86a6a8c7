import type { Actor } from '../policies/Actor.js';

declare module 'express-serve-static-core' {
  interface Request {
    /** Set by `authenticate`. */
    actor?: Actor;
    authenticatedBy?: 'cookie' | 'bearer';
    /** When the access token ends. */
    accessExpiresAt?: Date;
  }
}
