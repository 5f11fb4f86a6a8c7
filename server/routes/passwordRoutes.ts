import { changePasswordSchema, requestPasswordResetSchema, setPasswordSchema } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createPasswordController } from '../controllers/passwordController.js';
import type { RateLimits } from '../middleware/rateLimits.js';
import { route, type Route } from './Route.js';

export function passwordRoutes(deps: AppDependencies, limits: RateLimits): Route[] {
  const controller = createPasswordController(deps);
  const tag = 'Passwords';
  return [
    route({
      method: 'post',
      path: '/passwords/reset-request',
      tag,
      summary: 'Ask for a link to set a new password',
      description: 'Answers 202 whether the address is known or not.',
      access: 'anyone',
      body: requestPasswordResetSchema,
      before: limits.resetRequest,
      success: { status: 202, description: 'Accepted; if there is such an account, an e-mail is on its way.' },
      errors: { 429: 'TOO_MANY_REQUESTS' },
      handle: controller.requestReset,
    }),
    route({
      method: 'post',
      path: '/passwords',
      tag,
      summary: 'Set a password with the token of an invitation or reset link',
      access: 'anyone',
      body: setPasswordSchema,
      before: limits.setPassword,
      success: { status: 204 },
      errors: {
        400: 'INVALID_INPUT, PASSWORD_TOO_COMMON',
        410: 'LINK_USED, LINK_EXPIRED, LINK_UNKNOWN',
        429: 'TOO_MANY_REQUESTS',
      },
      handle: controller.setByLink,
    }),
    route({
      method: 'put',
      path: '/me/password',
      tag,
      summary: 'Change the own password; all other sessions end',
      access: 'signedIn',
      body: changePasswordSchema,
      before: limits.changePassword,
      success: { status: 204 },
      errors: { 400: 'INVALID_INPUT, PASSWORD_TOO_COMMON', 422: 'WRONG_PASSWORD', 429: 'TOO_MANY_REQUESTS' },
      handle: controller.change,
    }),
  ];
}
