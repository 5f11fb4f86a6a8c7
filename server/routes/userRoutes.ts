import { z } from 'zod';
import {
  inviteUserSchema,
  updateUserSchema,
  userDirectoryQuerySchema,
  userDirectorySchema,
  userListSchema,
  userSchema,
} from '../../shared/schemas/account.js';
import { idSchema } from '../../shared/schemas/common.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createUserController } from '../controllers/userController.js';
import { route, type Route } from './Route.js';

const params = z.strictObject({ userId: idSchema });

export function userRoutes(deps: AppDependencies): Route[] {
  const controller = createUserController(deps);
  const tag = 'Users';
  return [
    route({
      method: 'get',
      path: '/users',
      tag,
      summary: 'All users',
      access: 'admin',
      success: { status: 200, schema: userListSchema },
      handle: controller.list,
    }),
    route({
      method: 'get',
      path: '/users/directory',
      tag,
      summary: 'Active users by part of their name or address, to pick members from',
      access: 'admin',
      query: userDirectoryQuerySchema,
      success: { status: 200, schema: userDirectorySchema },
      handle: controller.directory,
    }),
    route({
      method: 'post',
      path: '/users',
      tag,
      summary: 'Invite a user; the invitation goes out by e-mail',
      access: 'admin',
      body: inviteUserSchema,
      success: { status: 201, schema: userSchema },
      errors: { 409: 'EMAIL_TAKEN' },
      handle: controller.invite,
    }),
    route({
      method: 'patch',
      path: '/users/:userId',
      tag,
      summary: 'Rename, make or unmake an administrator, activate or deactivate',
      description: 'Deactivating ends the sessions of the user at once.',
      access: 'admin',
      params,
      body: updateUserSchema,
      success: { status: 200, schema: userSchema },
      errors: { 404: 'NOT_FOUND', 409: 'LAST_ADMIN' },
      handle: controller.update,
    }),
    route({
      method: 'post',
      path: '/users/:userId/invitation',
      tag,
      summary: 'Send the invitation again',
      access: 'admin',
      params,
      success: { status: 202 },
      errors: { 404: 'NOT_FOUND', 409: 'ALREADY_ACCEPTED, USER_INACTIVE' },
      handle: controller.inviteAgain,
    }),
  ];
}
