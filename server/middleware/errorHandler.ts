import type { ErrorRequestHandler } from 'express';
import type { ErrorBody } from '../../shared/schemas/common.js';

import { toAppError } from '../errors/toAppError.js';
import type { Logger } from '../logging/createLogger.js';

/** The only place that shapes an error: one body for everything, nothing of the inside in it. */
export function errorHandler(logger: Logger): ErrorRequestHandler {
  return (thrown: unknown, req, res, next) => {
    const error = toAppError(thrown);
    if (error.kind !== 'user') {
      const level = error.kind === 'bug' ? 'error' : 'warn';
      logger[level]({ err: error.cause ?? error, requestId: req.id, code: error.code }, error.message);
    }
    if (res.headersSent) {
      // Too late for another answer: Express's own handler cuts the connection, so that nobody takes half for whole.
      next(thrown);
      return;
    }
    const body: ErrorBody = {
      error: {
        code: error.code,
        message: error.message,
        ...(error.details ? { details: error.details } : {}),
        requestId: String(req.id),
      },
    };
    res.set({ ...error.headers, 'Cache-Control': 'no-store' });
    res.status(error.status).json(body);
  };
}
