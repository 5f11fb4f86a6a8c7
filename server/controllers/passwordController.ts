import type { ChangePassword, SetPassword } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import type { Actor } from '../policies/Actor.js';
import type { RouteInput } from '../routes/Route.js';
import { PasswordService } from '../services/PasswordService.js';

export function createPasswordController(deps: AppDependencies) {
  const service = new PasswordService(deps);
  return {
    requestReset: ({ body }: RouteInput<unknown, unknown, { email: string }>) => service.requestReset(body.email),
    setByLink: ({ body }: RouteInput<unknown, unknown, SetPassword>) => service.setByLink(body),
    change: ({ actor, body }: RouteInput<unknown, unknown, ChangePassword, Actor>) => service.change(actor, body),
  };
}
