import type { EntityManager } from 'typeorm';
import { projectRoles, type ProjectRole } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { Membership, Project, User } from '../entities/index.js';
import { ConflictError, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { requireProjectAdministrator, requireProjectReader } from '../policies/requireProjectAccess.js';
import { addAuditEntry } from './audit.js';

export class MemberService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource'>) {}

  async list(actor: Actor, projectId: string): Promise<Membership[]> {
    requireProjectReader(actor, projectId);
    const { manager } = this.deps.dataSource;
    await this.requireProject(manager, projectId);
    return manager.find(Membership, {
      where: { projectId },
      relations: { user: true },
      order: { user: { name: 'ASC', id: 'ASC' } },
    });
  }

  /** Adds a member or replaces the roles of one. */
  async put(actor: Actor, projectId: string, userId: string, wanted: ProjectRole[]): Promise<Membership> {
    requireProjectAdministrator(actor, projectId);
    const roles = projectRoles.filter((role) => wanted.includes(role));
    return this.deps.dataSource.transaction(async (manager) => {
      await this.requireProject(manager, projectId);
      const user = await manager.findOneBy(User, { id: userId });
      if (!user) throw new NotFoundError();
      if (!user.isActive) {
        throw new ConflictError('USER_INACTIVE', 'This user is not active. Activate them before making them a member.');
      }
      const before = await manager.findOneBy(Membership, { projectId, userId });
      await manager.upsert(Membership, { projectId, userId, roles }, ['projectId', 'userId']);
      await addAuditEntry(manager, {
        actor,
        projectId,
        entityType: 'project',
        entityId: projectId,
        action: before ? 'changedMember' : 'addedMember',
        text: `${before ? 'set the roles of' : 'added'} ${user.name}: ${roles.join(', ')}`,
        details: { userId, before: before?.roles ?? [], after: roles },
      });
      return manager.findOneOrFail(Membership, { where: { projectId, userId }, relations: { user: true } });
    });
  }

  async remove(actor: Actor, projectId: string, userId: string): Promise<void> {
    requireProjectAdministrator(actor, projectId);
    await this.deps.dataSource.transaction(async (manager) => {
      const membership = await manager.findOne(Membership, {
        where: { projectId, userId },
        relations: { user: true },
      });
      if (!membership) throw new NotFoundError();
      await manager.delete(Membership, { projectId, userId });
      await addAuditEntry(manager, {
        actor,
        projectId,
        entityType: 'project',
        entityId: projectId,
        action: 'removedMember',
        text: `removed ${membership.user.name}`,
        details: { userId, before: membership.roles },
      });
    });
  }

  private async requireProject(manager: EntityManager, projectId: string): Promise<void> {
    if (!(await manager.existsBy(Project, { id: projectId }))) throw new NotFoundError();
  }
}
