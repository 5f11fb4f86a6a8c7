import type { AppDependencies } from '../AppDependencies.js';
import { rateLimits } from '../middleware/rateLimits.js';
import { batchRoutes } from './batchRoutes.js';
import { captureRoutes } from './captureRoutes.js';
import { mailRoutes } from './mailRoutes.js';
import { passwordRoutes } from './passwordRoutes.js';
import { projectRoutes } from './projectRoutes.js';
import type { Route } from './Route.js';
import { sessionRoutes } from './sessionRoutes.js';
import { systemRoutes } from './systemRoutes.js';
import { userRoutes } from './userRoutes.js';

/** Every route under /api/v1. A new resource adds its table here, and nowhere else. */
export function createRoutes(deps: AppDependencies): Route[] {
  const limits = rateLimits(deps.config);
  return [
    ...systemRoutes(deps),
    ...sessionRoutes(deps, limits),
    ...passwordRoutes(deps, limits),
    ...userRoutes(deps),
    ...projectRoutes(deps),
    ...batchRoutes(deps),
    ...captureRoutes(deps),
    ...mailRoutes(deps),
  ];
}
