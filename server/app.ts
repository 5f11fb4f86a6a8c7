import compression from 'compression';
import cookieParser from 'cookie-parser';
import express, { type Express } from 'express';
import type { AppDependencies } from './AppDependencies.js';
import { NotFoundError } from './errors/index.js';
import { errorHandler } from './middleware/errorHandler.js';
import { requestId } from './middleware/requestId.js';
import { requestLog } from './middleware/requestLog.js';
import { securityHeaders } from './middleware/securityHeaders.js';
import { serveClient } from './middleware/serveClient.js';
import { createApiRouter } from './routes/createApiRouter.js';
import { createRoutes } from './routes/index.js';

export function createApp(deps: AppDependencies): Express {
  const { config, logger } = deps;
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.TRUST_PROXY_HOPS);
  app.set('query parser', 'simple');

  app.use(requestId, requestLog(logger), securityHeaders(config), compression(), cookieParser());

  const routes = createRoutes(deps);
  app.use('/api/v1', createApiRouter(routes, deps));
  app.use('/api', () => {
    throw new NotFoundError('NO_SUCH_ROUTE', 'There is nothing at this address. See /api/docs for what there is.');
  });
  if (deps.clientDir) app.use(serveClient(deps.clientDir));
  app.use(() => {
    throw new NotFoundError('NO_SUCH_PAGE', 'There is nothing at this address.');
  });
  app.use(errorHandler(logger));
  return app;
}
