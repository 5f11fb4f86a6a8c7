import { json, type RequestHandler, type Router } from 'express';
import type { Config } from '../config/config.js';
import { requireAdmin } from '../middleware/authenticate.js';
import { requireClientHeader } from '../middleware/requireClientHeader.js';
import { validateAddress, validateBody } from '../middleware/validate.js';
import type { Route, RouteInput } from './Route.js';

/** Sheets, layouts and thresholds are small; captures come as multipart and are streamed. */
const readJson = json({ limit: '256kb', type: 'application/json' });

/** Puts one row of a table into Express: access, address, `before`, body, controller, answer. */
export function bindRoute(
  router: Router,
  route: Route,
  deps: { config: Pick<Config, 'NODE_ENV'> },
  authenticate: RequestHandler,
): void {
  const guards: RequestHandler[] = [];
  if (route.access !== 'anyone') guards.push(authenticate, requireClientHeader);
  if (route.access === 'admin') guards.push(requireAdmin);

  const checkAddress: RequestHandler = (req, _res, next) => {
    validateAddress(route, req);
    next();
  };

  const respond: RequestHandler = async (req, res) => {
    const body = validateBody(route, req);
    const input = { ...validateAddress(route, req), body, request: req, response: res, actor: req.actor };
    res.status(route.success.status);
    const result = await route.handle(input as RouteInput);
    if (route.success.contentType || res.headersSent) return;
    if (!route.success.schema) {
      res.end();
      return;
    }
    // Out of production a presenter that strays from its schema is found at once; in production it costs nothing.
    const answer = deps.config.NODE_ENV === 'production' ? result : route.success.schema.parse(result);
    res.json(answer);
  };

  const readBody = route.bodyType === 'multipart' ? [] : [readJson];
  router[route.method](route.path, ...guards, checkAddress, ...readBody, ...(route.before ?? []), respond);
}
