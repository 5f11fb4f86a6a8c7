import type { AppDependencies } from '../AppDependencies.js';
import type { Route } from './Route.js';

/** Every route under /api/v1. A new resource adds its table here, and nowhere else. */
export function createRoutes(_deps: AppDependencies): Route[] {
  return [];
}
