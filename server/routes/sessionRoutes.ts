import {
  currentSessionSchema,
  renewSessionSchema,
  sessionResponseSchema,
  signInSchema,
} from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createSessionController } from '../controllers/sessionController.js';
import type { RateLimits } from '../middleware/rateLimits.js';
import { route, type Route } from './Route.js';

export function sessionRoutes(deps: AppDependencies, limits: RateLimits): Route[] {
  const controller = createSessionController(deps);
  const path = '/session';
  const tag = 'Session';
  return [
    route({
      method: 'post',
      path,
      tag,
      summary: 'Sign in',
      description:
        'Sets the cookies of the browser client; scripts take `token` and send it as `Authorization: Bearer`.',
      access: 'anyone',
      body: signInSchema,
      before: limits.signIn,
      success: { status: 200, schema: sessionResponseSchema },
      errors: { 401: 'BAD_CREDENTIALS', 429: 'TOO_MANY_REQUESTS' },
      handle: controller.signIn,
    }),
    route({
      method: 'get',
      path,
      tag,
      summary: 'Who is signed in',
      access: 'signedIn',
      success: { status: 200, schema: currentSessionSchema },
      handle: controller.read,
    }),
    route({
      method: 'delete',
      path,
      tag,
      summary: 'Sign out: the session ends at once, everywhere',
      access: 'signedIn',
      success: { status: 204 },
      handle: controller.signOut,
    }),
    route({
      method: 'post',
      path: '/session/renewal',
      tag,
      summary: 'New access token from the renewal token',
      description:
        'Takes the renewal token from the cookie or from the body and answers its successor. A token that was followed by another one ends the session when it is used again.',
      access: 'anyone',
      body: renewSessionSchema.optional(),
      before: limits.renewal,
      success: { status: 200, schema: sessionResponseSchema },
      errors: { 401: 'UNAUTHENTICATED, SESSION_EXPIRED', 403: 'CLIENT_HEADER_MISSING', 429: 'TOO_MANY_REQUESTS' },
      handle: controller.renew,
    }),
  ];
}
