import type { Health, PublicSettings } from '../../shared/schemas/system.js';
import type { AppDependencies } from '../AppDependencies.js';
import { presentSettings } from '../presenters/presentSettings.js';
import type { RouteInput } from '../routes/Route.js';
import { checkHealth } from '../services/checkHealth.js';

export function createSystemController(deps: AppDependencies) {
  return {
    settings: (): PublicSettings => presentSettings(deps),

    /** The body is the same in both cases; the status is for probes that read nothing else. */
    health: async ({ response }: RouteInput): Promise<Health> => {
      const health = await checkHealth(deps);
      response.status(health.status === 'ok' ? 200 : 503);
      return health;
    },
  };
}
