import type { InviteUser, UpdateUser, UserDirectory, UserDto } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { presentUser } from '../presenters/presentUser.js';
import type { Actor } from '../policies/Actor.js';
import type { RouteInput } from '../routes/Route.js';
import { UserService } from '../services/UserService.js';

interface UserParams {
  userId: string;
}

export function createUserController(deps: AppDependencies) {
  const service = new UserService(deps);
  return {
    list: async (): Promise<{ items: UserDto[] }> => ({ items: (await service.list()).map(presentUser) }),

    directory: async ({ query }: RouteInput<unknown, { search?: string | undefined }>): Promise<UserDirectory> => {
      const users = await service.search(query.search);
      return { items: users.map(({ id, name, email }) => ({ id, name, email })) };
    },

    invite: async ({ actor, body }: RouteInput<unknown, unknown, InviteUser, Actor>): Promise<UserDto> =>
      presentUser(await service.invite(actor, body)),

    inviteAgain: ({ actor, params }: RouteInput<UserParams, unknown, unknown, Actor>) =>
      service.inviteAgain(actor, params.userId),

    update: async ({ actor, params, body }: RouteInput<UserParams, unknown, UpdateUser, Actor>): Promise<UserDto> =>
      presentUser(await service.update(actor, params.userId, body)),
  };
}
