import { healthSchema, publicSettingsSchema } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createSystemController } from '../controllers/systemController.js';
import { route, type Route } from './Route.js';

const tag = 'System';

export function systemRoutes(deps: AppDependencies): Route[] {
  const controller = createSystemController(deps);
  return [
    route({
      method: 'get',
      path: '/settings',
      tag,
      summary: 'What a client must know before sign-in: limits, version, demo sign-ins',
      access: 'anyone',
      success: { status: 200, schema: publicSettingsSchema },
      handle: controller.settings,
    }),
  ];
}

/** Mounted on /api itself: probes should not depend on a version of the API. */
export function healthRoutes(deps: AppDependencies): Route[] {
  const controller = createSystemController(deps);
  return [
    route({
      method: 'get',
      path: '/health',
      tag,
      summary: 'Whether database, queue and storage answer',
      access: 'anyone',
      success: { status: 200, schema: healthSchema },
      errors: { 503: 'The same body; says which part does not answer' },
      handle: controller.health,
    }),
  ];
}
