import type { EntityManager } from 'typeorm';
import { passwordSchema, type InviteUser } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { User } from '../entities/index.js';
import { ConflictError, InvalidInputError, isUniqueViolation, NotFoundError } from '../errors/index.js';
import { revokeSessions } from '../repositories/sessionRepository.js';
import { requireUncommonPassword } from '../security/requireUncommonPassword.js';
import { addAuditEntry } from './audit.js';
import { createOneTimeLink } from './oneTimeLinks.js';

/** What the command does with users: whoever can run it on the machine needs no sign-in. */
export class UserCommandService {
  constructor(private readonly deps: Pick<AppDependencies, 'config' | 'dataSource' | 'now' | 'passwords'>) {}

  list(): Promise<User[]> {
    return this.deps.dataSource.manager.find(User, { order: { email: 'ASC' } });
  }

  /** @returns the address at which the user chooses a password */
  async addWithInvitation(data: InviteUser): Promise<string> {
    return this.add(data, null, async (manager, user) => {
      const { publicUrl } = this.deps.config;
      return (await createOneTimeLink(manager, { user, kind: 'invitation', publicUrl, at: this.deps.now() })).url;
    });
  }

  /** @throws InvalidInputError for a password that people would not be allowed either */
  async addWithPassword(data: InviteUser, password: string): Promise<void> {
    const parsed = passwordSchema.safeParse(password);
    if (!parsed.success) {
      throw new InvalidInputError('INVALID_INPUT', 'A password has 10 to 200 characters.');
    }
    requireUncommonPassword(password, data, 'password');
    const passwordHash = await this.deps.passwords.hash(password);
    await this.add(data, passwordHash, () => Promise.resolve());
  }

  async deactivate(email: string): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      const user = await manager.findOneBy(User, { email });
      if (!user) throw new NotFoundError('NOT_FOUND', `There is no user ${email}.`);
      await manager.update(User, { id: user.id }, { isActive: false });
      await revokeSessions(manager, user.id, this.deps.now());
      await addAuditEntry(manager, {
        actor: null,
        entityType: 'user',
        entityId: user.id,
        action: 'deactivated',
        text: `deactivated ${user.name} by command`,
      });
    });
  }

  private async add<T>(
    data: InviteUser,
    passwordHash: string | null,
    finish: (manager: EntityManager, user: User) => Promise<T>,
  ): Promise<T> {
    try {
      return await this.deps.dataSource.transaction(async (manager) => {
        const user = await manager.save(User, manager.create(User, { ...data, passwordHash }));
        await addAuditEntry(manager, {
          actor: null,
          entityType: 'user',
          entityId: user.id,
          action: 'added',
          text: `added ${data.name} (${data.email}) by command${data.isAdmin ? ' as administrator' : ''}`,
        });
        return await finish(manager, user);
      });
    } catch (error) {
      if (!isUniqueViolation(error)) throw error;
      throw new ConflictError('EMAIL_TAKEN', `There is a user with the address ${data.email} already.`, {
        cause: error,
      });
    }
  }
}
