import { Router } from 'express';
import type { AppDependencies } from '../AppDependencies.js';
import { MethodNotAllowedError, NotFoundError } from '../errors/index.js';
import { authenticate } from '../middleware/authenticate.js';
import { bindRoute } from './bindRoute.js';
import type { Route } from './Route.js';

/** All rows as one router; other methods of a known path answer 405, other paths 404. */
export function createApiRouter(routes: Route[], deps: AppDependencies): Router {
  const router = Router({ strict: false, caseSensitive: true });
  const requireSession = authenticate(deps);
  router.use((_req, res, next) => {
    res.set('Cache-Control', 'no-store');
    next();
  });
  for (const route of routes) bindRoute(router, route, deps, requireSession);
  for (const [path, methods] of methodsByPath(routes)) {
    const allowed = methods.map((method) => method.toUpperCase()).join(', ');
    router.all(path, () => {
      throw new MethodNotAllowedError(undefined, undefined, { headers: { Allow: allowed } });
    });
  }
  router.use(() => {
    throw new NotFoundError('NO_SUCH_ROUTE', 'There is nothing at this address. See /api/docs for what there is.');
  });
  return router;
}

function methodsByPath(routes: Route[]): Map<string, string[]> {
  const byPath = new Map<string, string[]>();
  for (const route of routes) byPath.set(route.path, [...(byPath.get(route.path) ?? []), route.method]);
  return byPath;
}
