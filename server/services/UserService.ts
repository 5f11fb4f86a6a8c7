import { ILike, type EntityManager } from 'typeorm';
import type { InviteUser, UpdateUser } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { User } from '../entities/index.js';
import { ConflictError, isUniqueViolation, NotFoundError } from '../errors/index.js';
import { invitationMail } from '../mailbox/invitationMail.js';
import { queueMail } from '../mailbox/queueMail.js';
import type { Actor } from '../policies/Actor.js';
import { escapeLikePattern } from '../repositories/escapeLikePattern.js';
import { revokeSessions } from '../repositories/sessionRepository.js';
import { addAuditEntry } from './audit.js';
import { createOneTimeLink, invitationDaysValid } from './oneTimeLinks.js';

const directoryLimit = 50;

export class UserService {
  constructor(private readonly deps: Pick<AppDependencies, 'config' | 'dataSource' | 'now'>) {}

  list(): Promise<User[]> {
    return this.deps.dataSource.manager.find(User, { order: { name: 'ASC', id: 'ASC' } });
  }

  /** Active users whose name or address contains the text. */
  search(text: string | undefined): Promise<User[]> {
    const pattern = ILike(`%${escapeLikePattern(text ?? '')}%`);
    return this.deps.dataSource.manager.find(User, {
      where: [
        { isActive: true, name: pattern },
        { isActive: true, email: pattern },
      ],
      order: { name: 'ASC', id: 'ASC' },
      take: directoryLimit,
    });
  }

  /** @throws ConflictError `EMAIL_TAKEN` */
  async invite(actor: Actor, { email, name, isAdmin }: InviteUser): Promise<User> {
    try {
      return await this.deps.dataSource.transaction(async (manager) => {
        const user = await manager.save(User, manager.create(User, { email, name, isAdmin, passwordHash: null }));
        await this.sendInvitation(manager, actor, user);
        await addAuditEntry(manager, {
          actor,
          entityType: 'user',
          entityId: user.id,
          action: 'invited',
          text: `invited ${name} (${email})${isAdmin ? ' as administrator' : ''}`,
        });
        return manager.findOneByOrFail(User, { id: user.id });
      });
    } catch (error) {
      if (!isUniqueViolation(error)) throw error;
      throw new ConflictError('EMAIL_TAKEN', 'There is a user with this e-mail address already.', { cause: error });
    }
  }

  /** @throws ConflictError when there is nothing to accept any more */
  async inviteAgain(actor: Actor, userId: string): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      const user = await this.load(manager, userId);
      if (user.passwordHash !== null) {
        throw new ConflictError('ALREADY_ACCEPTED', 'This user has chosen a password already.');
      }
      if (!user.isActive) throw new ConflictError('USER_INACTIVE', 'This user is not active. Activate them first.');
      await this.sendInvitation(manager, actor, user);
      await addAuditEntry(manager, {
        actor,
        entityType: 'user',
        entityId: user.id,
        action: 'invitedAgain',
        text: `sent the invitation to ${user.name} again`,
      });
    });
  }

  /** Deactivating ends the user's sessions. @throws ConflictError `LAST_ADMIN` */
  async update(actor: Actor, userId: string, change: UpdateUser): Promise<User> {
    return this.deps.dataSource.transaction(async (manager) => {
      // All administrators are locked, so that two of them can't remove each other at the same moment.
      const admins = await manager.find(User, {
        where: { isAdmin: true, isActive: true },
        lock: { mode: 'pessimistic_write' },
        order: { id: 'ASC' },
      });
      const user = await this.load(manager, userId);
      const losesAdmin = change.isAdmin === false || change.isActive === false;
      if (losesAdmin && admins.length === 1 && admins[0]?.id === userId) {
        throw new ConflictError('LAST_ADMIN', 'This is the last active administrator. Make another one first.');
      }
      const { name = user.name, isAdmin = user.isAdmin, isActive = user.isActive } = change;
      await manager.update(User, { id: userId }, { name, isAdmin, isActive });
      if (!isActive && user.isActive) await revokeSessions(manager, userId, this.deps.now());
      await addAuditEntry(manager, {
        actor,
        entityType: 'user',
        entityId: userId,
        action: 'updated',
        text: `changed the account of ${user.name}`,
        details: {
          before: { name: user.name, isAdmin: user.isAdmin, isActive: user.isActive },
          after: { name, isAdmin, isActive },
        },
      });
      return this.load(manager, userId);
    });
  }

  private async load(manager: EntityManager, userId: string): Promise<User> {
    const user = await manager.findOneBy(User, { id: userId });
    if (!user) throw new NotFoundError();
    return user;
  }

  private async sendInvitation(manager: EntityManager, actor: Actor, user: User): Promise<void> {
    const { linkId, url } = await createOneTimeLink(manager, {
      user,
      kind: 'invitation',
      publicUrl: this.deps.config.publicUrl,
      at: this.deps.now(),
    });
    await queueMail(manager, {
      dedupeKey: `invitation:${linkId}`,
      kind: 'invitation',
      recipient: user.email,
      ...invitationMail({ recipientName: user.name, invitedByName: actor.name, url, daysValid: invitationDaysValid }),
    });
  }
}
