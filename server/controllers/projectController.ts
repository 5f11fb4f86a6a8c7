import { projectRoles } from '../../shared/schemas/account.js';
import type { CreateProject, MemberDto, ProjectDto, PutMember, UpdateProject } from '../../shared/schemas/project.js';
import type { ChangeThresholds, ThresholdsResponse } from '../../shared/schemas/thresholds.js';
import type { AppDependencies } from '../AppDependencies.js';
import { presentMember } from '../presenters/presentMember.js';
import { presentProject } from '../presenters/presentProject.js';
import { presentThresholds } from '../presenters/presentThresholds.js';
import type { Actor } from '../policies/Actor.js';
import type { RouteInput } from '../routes/Route.js';
import { MemberService } from '../services/MemberService.js';
import { ProjectService } from '../services/ProjectService.js';
import { ThresholdsService } from '../services/ThresholdsService.js';

interface ProjectParams {
  projectId: string;
}
interface MemberParams extends ProjectParams {
  userId: string;
}
type Input<P = unknown, B = unknown> = RouteInput<P, unknown, B, Actor>;

export function createProjectController(deps: AppDependencies) {
  const projects = new ProjectService(deps);
  const members = new MemberService(deps);
  const thresholds = new ThresholdsService(deps);
  return {
    list: async ({ actor }: Input): Promise<{ items: ProjectDto[] }> => ({
      items: (await projects.list(actor)).map((project) => presentProject(project, actor)),
    }),

    read: async ({ actor, params }: Input<ProjectParams>): Promise<ProjectDto> =>
      presentProject(await projects.read(actor, params.projectId), actor),

    create: async ({ actor, body }: Input<unknown, CreateProject>): Promise<ProjectDto> => {
      const project = await projects.create(actor, body);
      const membership = { projectId: project.id, projectName: project.name, roles: [...projectRoles] };
      return presentProject(project, { ...actor, memberships: [...actor.memberships, membership] });
    },

    update: async ({ actor, params, body }: Input<ProjectParams, UpdateProject>): Promise<ProjectDto> =>
      presentProject(await projects.update(actor, params.projectId, body), actor),

    listMembers: async ({ actor, params }: Input<ProjectParams>): Promise<{ items: MemberDto[] }> => ({
      items: (await members.list(actor, params.projectId)).map(presentMember),
    }),

    putMember: async ({ actor, params, body }: Input<MemberParams, PutMember>): Promise<MemberDto> =>
      presentMember(await members.put(actor, params.projectId, params.userId, body.roles)),

    removeMember: ({ actor, params }: Input<MemberParams>) => members.remove(actor, params.projectId, params.userId),

    readThresholds: async ({ actor, params }: Input<ProjectParams>): Promise<ThresholdsResponse> =>
      presentThresholds(await thresholds.read(actor, params.projectId)),

    changeThresholds: async ({
      actor,
      params,
      body,
    }: Input<ProjectParams, ChangeThresholds>): Promise<ThresholdsResponse> =>
      presentThresholds(await thresholds.change(actor, params.projectId, body)),
  };
}
