import type { EntityManager } from 'typeorm';
import { projectRoles } from '../../shared/schemas/account.js';
import type { CreateProject, UpdateProject } from '../../shared/schemas/project.js';
import { defaultThresholds } from '../../shared/schemas/thresholds.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Membership, Project, ThresholdsVersion } from '../entities/index.js';
import { ConflictError, isUniqueViolation, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { requireProjectAdministrator, requireProjectReader } from '../policies/requireProjectAccess.js';
import { findProjectsWithCounts, type ProjectWithCounts } from '../repositories/projectRepository.js';
import { addAuditEntry } from './audit.js';

async function nameMustBeFree<T>(work: () => Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    if (!isUniqueViolation(error)) throw error;
    throw new ConflictError('PROJECT_NAME_TAKEN', 'There is a project with this name already.', { cause: error });
  }
}

export class ProjectService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource'>) {}

  /** The actor's own projects; all of them for an administrator. */
  list(actor: Actor): Promise<ProjectWithCounts[]> {
    const ids = actor.isAdmin ? null : actor.memberships.map(({ projectId }) => projectId);
    return findProjectsWithCounts(this.deps.dataSource, ids);
  }

  async read(actor: Actor, projectId: string): Promise<ProjectWithCounts> {
    requireProjectReader(actor, projectId);
    return this.load(this.deps.dataSource.manager, projectId);
  }

  /** The creator becomes a member with all roles, and the thresholds begin at their defaults. */
  async create(actor: Actor, { name, description }: CreateProject): Promise<ProjectWithCounts> {
    return nameMustBeFree(() =>
      this.deps.dataSource.transaction(async (manager) => {
        const project = await manager.save(Project, manager.create(Project, { name, description }));
        const projectId = project.id;
        await manager.insert(Membership, { projectId, userId: actor.userId, roles: [...projectRoles] });
        await manager.insert(ThresholdsVersion, {
          projectId,
          version: 1,
          values: defaultThresholds,
          authorId: actor.userId,
          reason: 'Initial values',
        });
        await addAuditEntry(manager, {
          actor,
          projectId,
          entityType: 'project',
          entityId: projectId,
          action: 'created',
          text: `created the project ${name}`,
        });
        return this.load(manager, projectId);
      }),
    );
  }

  async update(actor: Actor, projectId: string, change: UpdateProject): Promise<ProjectWithCounts> {
    requireProjectAdministrator(actor, projectId);
    return nameMustBeFree(() =>
      this.deps.dataSource.transaction(async (manager) => {
        const before = await this.load(manager, projectId);
        const { name = before.name, description = before.description, isArchived = before.isArchived } = change;
        await manager.update(Project, { id: projectId }, { name, description, isArchived });
        await addAuditEntry(manager, {
          actor,
          projectId,
          entityType: 'project',
          entityId: projectId,
          action: 'updated',
          text: `changed the project ${before.name}`,
          details: {
            before: { name: before.name, description: before.description, isArchived: before.isArchived },
            after: { name, description, isArchived },
          },
        });
        return this.load(manager, projectId);
      }),
    );
  }

  private async load(manager: EntityManager, projectId: string): Promise<ProjectWithCounts> {
    const [project] = await findProjectsWithCounts(manager, [projectId]);
    if (!project) throw new NotFoundError();
    return project;
  }
}
