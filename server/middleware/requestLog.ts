import type { RequestHandler } from 'express';
import { pinoHttp } from 'pino-http';
import type { Logger } from '../logging/createLogger.js';
import './requestTypes.js';

/** One line a request: no headers, no bodies, no query, so that no secret can get in. */
export function requestLog(logger: Logger): RequestHandler {
  return pinoHttp({
    logger,
    genReqId: (req) => req.id,
    customLogLevel: (_req, res, error) => {
      if (res.statusCode >= 500) return 'error';
      if (error || res.statusCode === 401 || res.statusCode === 403 || res.statusCode === 429) return 'warn';
      return 'info';
    },
    autoLogging: { ignore: (req) => req.url === '/api/health' || !req.url?.startsWith('/api') },
    serializers: {
      req: (req: { id: unknown; method: string; url: string; remoteAddress?: string }) => ({
        id: req.id,
        method: req.method,
        path: req.url.split('?')[0],
        remoteAddress: req.remoteAddress,
      }),
      res: (res: { statusCode: number }) => ({ status: res.statusCode }),
    },
    customProps: (req) => ('actor' in req ? { userId: (req.actor as { userId?: string } | undefined)?.userId } : {}),
  });
}
