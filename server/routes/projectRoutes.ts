import { z } from 'zod';
import { idSchema } from '../../shared/schemas/common.js';
import {
  createProjectSchema,
  memberListSchema,
  memberSchema,
  projectListSchema,
  projectSchema,
  putMemberSchema,
  updateProjectSchema,
} from '../../shared/schemas/project.js';
import { changeThresholdsSchema, thresholdsResponseSchema } from '../../shared/schemas/thresholds.js';
import type { AppDependencies } from '../AppDependencies.js';
import { createProjectController } from '../controllers/projectController.js';
import { route, type Route } from './Route.js';

const params = z.strictObject({ projectId: idSchema });
const memberParams = params.extend({ userId: idSchema });

export function projectRoutes(deps: AppDependencies): Route[] {
  const controller = createProjectController(deps);
  const tag = 'Projects';
  return [
    route({
      method: 'get',
      path: '/projects',
      tag,
      summary: 'The own projects; all of them for an administrator',
      access: 'signedIn',
      success: { status: 200, schema: projectListSchema },
      handle: controller.list,
    }),
    route({
      method: 'post',
      path: '/projects',
      tag,
      summary: 'Create a project; the creator becomes a member with all roles',
      access: 'admin',
      body: createProjectSchema,
      success: { status: 201, schema: projectSchema },
      errors: { 409: 'PROJECT_NAME_TAKEN' },
      handle: controller.create,
    }),
    route({
      method: 'get',
      path: '/projects/:projectId',
      tag,
      summary: 'One project',
      access: 'signedIn',
      params,
      success: { status: 200, schema: projectSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.read,
    }),
    route({
      method: 'patch',
      path: '/projects/:projectId',
      tag,
      summary: 'Rename, describe or archive a project (administrators)',
      access: 'signedIn',
      params,
      body: updateProjectSchema,
      success: { status: 200, schema: projectSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'PROJECT_NAME_TAKEN' },
      handle: controller.update,
    }),
    route({
      method: 'get',
      path: '/projects/:projectId/members',
      tag,
      summary: 'Members and their roles',
      access: 'signedIn',
      params,
      success: { status: 200, schema: memberListSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.listMembers,
    }),
    route({
      method: 'put',
      path: '/projects/:projectId/members/:userId',
      tag,
      summary: 'Add a member or replace the roles of one (administrators)',
      access: 'signedIn',
      params: memberParams,
      body: putMemberSchema,
      success: { status: 200, schema: memberSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND', 409: 'USER_INACTIVE' },
      handle: controller.putMember,
    }),
    route({
      method: 'delete',
      path: '/projects/:projectId/members/:userId',
      tag,
      summary: 'Remove a member (administrators)',
      access: 'signedIn',
      params: memberParams,
      success: { status: 204 },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND' },
      handle: controller.removeMember,
    }),
    route({
      method: 'get',
      path: '/projects/:projectId/thresholds',
      tag,
      summary: 'Thresholds in force and all versions before',
      access: 'signedIn',
      params,
      success: { status: 200, schema: thresholdsResponseSchema },
      errors: { 404: 'NOT_FOUND' },
      handle: controller.readThresholds,
    }),
    route({
      method: 'put',
      path: '/projects/:projectId/thresholds',
      tag,
      summary: 'A new version of the thresholds (administrators)',
      description:
        'Takes `{values, reason}`, or the bare values. Values left out keep what is in force. Captures screened before keep the version they were judged with.',
      access: 'signedIn',
      params,
      body: changeThresholdsSchema,
      success: { status: 200, schema: thresholdsResponseSchema },
      errors: { 403: 'FORBIDDEN', 404: 'NOT_FOUND' },
      handle: controller.changeThresholds,
    }),
  ];
}
