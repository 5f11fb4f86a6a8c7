import type { Request, RequestHandler } from 'express';
import { ipKeyGenerator, rateLimit } from 'express-rate-limit';
import type { Config } from '../config/config.js';
import { TooManyRequestsError } from '../errors/index.js';

const windowMs = 15 * 60_000;

/** An IPv6 customer holds a /64: counting single addresses there would count nothing. */
const addressOf = (req: Request): string => ipKeyGenerator(req.ip ?? 'unknown', 64);

function emailOf(req: Request): string {
  const body: unknown = req.body;
  const email = typeof body === 'object' && body !== null && 'email' in body ? body.email : '';
  return typeof email === 'string' ? email.trim().toLowerCase().slice(0, 254) : '';
}

function limit(options: {
  max: number;
  /** Requests with an empty key are not counted. */
  key: (req: Request) => string;
  failuresOnly?: boolean;
}): RequestHandler {
  return rateLimit({
    windowMs,
    limit: options.max,
    keyGenerator: options.key,
    skip: (req) => options.key(req) === '',
    skipSuccessfulRequests: options.failuresOnly ?? false,
    standardHeaders: false,
    legacyHeaders: false,
    // Its start-up checks only warn about settings that are fixed here; a forged X-Forwarded-For needs no log line.
    validate: false,
    handler: (_req, _res, next) => {
      next(
        new TooManyRequestsError(undefined, 'Too many tries. Wait 15 minutes and try again.', {
          headers: { 'Retry-After': String(windowMs / 1000) },
        }),
      );
    },
  });
}

/**
 * Counted per account and address together, so that a stranger elsewhere can't lock an account out,
 * and per address over all accounts, so that one machine can't try a list of them.
 */
export function rateLimits(config: Pick<Config, 'SIGN_IN_ATTEMPTS_PER_15_MIN'>) {
  const attempts = config.SIGN_IN_ATTEMPTS_PER_15_MIN;
  return {
    signIn: [
      limit({ max: attempts, key: (req) => `${emailOf(req)} ${addressOf(req)}`, failuresOnly: true }),
      limit({ max: attempts * 5, key: addressOf, failuresOnly: true }),
    ],
    resetRequest: [limit({ max: 5, key: emailOf }), limit({ max: attempts * 3, key: addressOf })],
    setPassword: [limit({ max: attempts * 3, key: addressOf, failuresOnly: true })],
    changePassword: [limit({ max: attempts, key: (req) => req.actor?.userId ?? addressOf(req), failuresOnly: true })],
    renewal: [limit({ max: attempts * 20, key: addressOf, failuresOnly: true })],
  };
}

export type RateLimits = ReturnType<typeof rateLimits>;
