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
import { createDocument, type MountedRoutes } from './openapi/createDocument.js';
import type { JsonObject } from './openapi/SchemaWriter.js';
import { serveDocs } from './openapi/serveDocs.js';
import { createApiRouter } from './routes/createApiRouter.js';
import { documentRoutes } from './routes/documentRoutes.js';
import { createRoutes } from './routes/index.js';
import { healthRoutes } from './routes/systemRoutes.js';

export function createApp(deps: AppDependencies): Express {
  const { config, logger } = deps;
  const app = express();
  app.disable('x-powered-by');
  app.set('trust proxy', config.TRUST_PROXY_HOPS);
  app.set('query parser', 'simple');
  // Answers of the API are not stored anywhere, so there is nothing to compare them with.
  app.set('etag', false);

  app.use(requestId, requestLog(logger), securityHeaders(config), compression(), cookieParser());

  const mounted: MountedRoutes[] = [
    { prefix: '/api', routes: healthRoutes(deps) },
    { prefix: '/api/v1', routes: createRoutes(deps) },
  ];
  // The document describes itself too, so its row is added to the table that it is made from.
  const document: JsonObject = {};
  mounted.push({ prefix: '/api/v1', routes: documentRoutes(document) });
  Object.assign(document, createDocument(mounted, deps));

  app.use('/api/docs', serveDocs(document));
  for (const prefix of ['/api/v1', '/api']) {
    const rows = mounted.filter((part) => part.prefix === prefix).flatMap(({ routes }) => routes);
    app.use(prefix, createApiRouter(rows, deps));
  }
  if (deps.clientDir) app.use(serveClient(deps.clientDir));
  app.use(() => {
    throw new NotFoundError('NO_SUCH_PAGE', 'There is nothing at this address.');
  });
  app.use(errorHandler(logger));
  return app;
}
