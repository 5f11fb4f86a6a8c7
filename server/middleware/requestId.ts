import { randomUUID } from 'node:crypto';
import type { RequestHandler } from 'express';

/** Names the request in the answer, in error bodies and in the log. Never taken from the caller. */
export const requestId: RequestHandler = (req, res, next) => {
  req.id = randomUUID();
  res.setHeader('X-Request-Id', req.id);
  next();
};
