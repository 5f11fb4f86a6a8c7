import type { RequestHandler } from 'express';
import { ForbiddenError } from '../errors/index.js';
import './requestTypes.js';

export const clientHeaderName = 'X-Overfold-Client';

const readOnlyMethods = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * A page of another site can make a browser send our cookies, but not this header without asking first.
 * Bearer tokens are not sent by browsers on their own, so they need none.
 */
export const requireClientHeader: RequestHandler = (req, _res, next) => {
  if (req.authenticatedBy === 'cookie' && !readOnlyMethods.has(req.method) && req.get(clientHeaderName) !== 'web') {
    throw new ForbiddenError(
      'CLIENT_HEADER_MISSING',
      `Changes made with a sign-in cookie need the header "${clientHeaderName}: web". Scripts send "Authorization: Bearer" instead.`,
    );
  }
  next();
};
