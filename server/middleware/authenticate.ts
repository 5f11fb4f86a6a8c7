import type { Request, RequestHandler } from 'express';
import type { AppDependencies } from '../AppDependencies.js';
import { ForbiddenError, UnauthenticatedError } from '../errors/index.js';
import { findLiveSession, touchSession } from '../repositories/sessionRepository.js';
import { AccessTokens } from '../security/AccessTokens.js';
import { sessionCookies } from '../security/sessionCookies.js';
import './requestTypes.js';

/** Writing the last use on every request would double its cost; a minute is close enough for an idle limit of hours. */
const touchIntervalMs = 60_000;

/** Sets `req.actor` from a bearer token or the access cookie. The session's row is looked up every time. */
export function authenticate(deps: Pick<AppDependencies, 'config' | 'dataSource' | 'now'>): RequestHandler {
  const { config, dataSource, now } = deps;
  const tokens = new AccessTokens(config.JWT_SECRET, config.ACCESS_TOKEN_MINUTES, now);
  const cookies = sessionCookies(config);
  const idleLimitMs = config.SESSION_IDLE_HOURS * 3_600_000;

  return async (req, _res, next) => {
    const bearer = readBearer(req);
    const token = bearer ?? cookies.readAccess(req);
    if (!token) throw new UnauthenticatedError();
    const claims = tokens.verify(token);
    const session = await findLiveSession(dataSource, claims.sessionId, claims.userId);
    if (!session) throw new UnauthenticatedError();
    const at = now();
    const idleMs = at.getTime() - session.lastUsedAt.getTime();
    if (session.expiresAt <= at || idleMs > idleLimitMs) {
      throw new UnauthenticatedError('SESSION_EXPIRED', 'The session has expired. Sign in again.');
    }
    if (idleMs > touchIntervalMs) await touchSession(dataSource, claims.sessionId, at);
    req.actor = session.actor;
    req.authenticatedBy = bearer ? 'bearer' : 'cookie';
    req.accessExpiresAt = claims.expiresAt;
    next();
  };
}

export const requireAdmin: RequestHandler = (req, _res, next) => {
  if (!req.actor?.isAdmin) throw new ForbiddenError('FORBIDDEN', 'Only an administrator may do this.');
  next();
};

function readBearer(req: Request): string | undefined {
  const header = req.get('authorization');
  return header === undefined ? undefined : (/^Bearer ([\w.~+/=-]{1,4096})$/i.exec(header)?.[1] ?? '');
}
