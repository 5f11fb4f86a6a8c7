import type { Response } from 'express';
import type { CurrentSession, SessionResponse, SignIn } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { ForbiddenError } from '../errors/index.js';
import { clientHeaderName } from '../middleware/requireClientHeader.js';
import { presentSessionUser } from '../presenters/presentSessionUser.js';
import type { Actor } from '../policies/Actor.js';
import type { RouteInput } from '../routes/Route.js';
import { sessionCookies } from '../security/sessionCookies.js';
import { SessionService, type IssuedSession } from '../services/SessionService.js';

export function createSessionController(deps: AppDependencies) {
  const service = new SessionService(deps);
  const cookies = sessionCookies(deps.config);

  const answer = (response: Response, issued: IssuedSession): SessionResponse => {
    cookies.write(response, issued);
    return {
      token: issued.token,
      expiresAt: issued.expiresAt.toISOString(),
      renewalToken: issued.renewalToken,
      user: presentSessionUser(issued.actor),
    };
  };

  return {
    signIn: async ({ body, response }: RouteInput<unknown, unknown, SignIn>): Promise<SessionResponse> =>
      answer(response, await service.signIn(body)),

    renew: async ({
      body,
      request,
      response,
    }: RouteInput<unknown, unknown, { renewalToken?: string | undefined } | undefined>): Promise<SessionResponse> => {
      const fromBody = body?.renewalToken;
      // The cookie comes along on its own, so here too the header shows that our page asks.
      if (!fromBody && request.get(clientHeaderName) !== 'web' && cookies.readRenewal(request)) {
        throw new ForbiddenError(
          'CLIENT_HEADER_MISSING',
          `Renewal by cookie needs the header "${clientHeaderName}: web".`,
        );
      }
      return answer(response, await service.renew(fromBody ?? cookies.readRenewal(request)));
    },

    read: ({ actor, request }: RouteInput<unknown, unknown, unknown, Actor>): CurrentSession => ({
      user: presentSessionUser(actor),
      expiresAt: (request.accessExpiresAt ?? deps.now()).toISOString(),
    }),

    signOut: async ({ actor, response }: RouteInput<unknown, unknown, unknown, Actor>): Promise<void> => {
      await service.signOut(actor);
      cookies.clear(response);
    },
  };
}
