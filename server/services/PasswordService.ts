import type { ChangePassword, SetPassword } from '../../shared/schemas/account.js';
import type { AppDependencies } from '../AppDependencies.js';
import { User } from '../entities/index.js';
import { UnprocessableError } from '../errors/index.js';
import { passwordResetMail } from '../mailbox/passwordResetMail.js';
import { queueMail } from '../mailbox/queueMail.js';
import type { Actor } from '../policies/Actor.js';
import { revokeSessions } from '../repositories/sessionRepository.js';
import { requireUncommonPassword } from '../security/requireUncommonPassword.js';
import { addAuditEntry } from './audit.js';
import { closeOpenLinks, createOneTimeLink, findUsableLink, resetMinutesValid } from './oneTimeLinks.js';

export class PasswordService {
  constructor(private readonly deps: Pick<AppDependencies, 'config' | 'dataSource' | 'now' | 'passwords'>) {}

  /** Says nothing about whether the address is known: only its owner learns it, by e-mail. */
  async requestReset(email: string): Promise<void> {
    const { dataSource, config, now } = this.deps;
    await dataSource.transaction(async (manager) => {
      const user = await manager.findOneBy(User, { email, isActive: true });
      if (!user) return;
      const { linkId, url } = await createOneTimeLink(manager, {
        user,
        kind: 'passwordReset',
        publicUrl: config.publicUrl,
        at: now(),
      });
      await queueMail(manager, {
        dedupeKey: `passwordReset:${linkId}`,
        kind: 'passwordReset',
        recipient: user.email,
        ...passwordResetMail({ recipientName: user.name, url, minutesValid: resetMinutesValid }),
      });
    });
  }

  /** Accepts an invitation or completes a reset. @throws GoneError when the link buys nothing any more */
  async setByLink({ token, password }: SetPassword): Promise<void> {
    const { dataSource, now } = this.deps;
    const { user } = await findUsableLink(dataSource.manager, token, now());
    requireUncommonPassword(password, user, 'body.password');
    // Hashing takes long on purpose: not while the row is locked.
    const passwordHash = await this.deps.passwords.hash(password);
    await dataSource.transaction(async (manager) => {
      const at = now();
      const link = await findUsableLink(manager, token, at, { lock: true });
      await manager.update(User, { id: link.userId }, { passwordHash });
      await closeOpenLinks(manager, link.userId, at);
      await revokeSessions(manager, link.userId, at);
      await addAuditEntry(manager, {
        actor: { userId: user.id, name: user.name },
        entityType: 'user',
        entityId: user.id,
        action: link.kind === 'invitation' ? 'acceptedInvitation' : 'resetPassword',
        text: link.kind === 'invitation' ? 'accepted the invitation' : 'set a new password by e-mail link',
      });
    });
  }

  /** Needs the present password; every other session of the user ends. */
  async change(actor: Actor, { currentPassword, newPassword }: ChangePassword): Promise<void> {
    const { dataSource, now } = this.deps;
    const user = await dataSource.manager.findOneByOrFail(User, { id: actor.userId });
    if (!(await this.deps.passwords.matches(currentPassword, user.passwordHash))) {
      const message = 'The current password is wrong.';
      throw new UnprocessableError('WRONG_PASSWORD', message, { details: [{ path: 'body.currentPassword', message }] });
    }
    requireUncommonPassword(newPassword, user, 'body.newPassword');
    const passwordHash = await this.deps.passwords.hash(newPassword);
    await dataSource.transaction(async (manager) => {
      const at = now();
      await manager.update(User, { id: user.id }, { passwordHash });
      await closeOpenLinks(manager, user.id, at);
      await revokeSessions(manager, user.id, at, actor.sessionId);
      await addAuditEntry(manager, {
        actor,
        entityType: 'user',
        entityId: user.id,
        action: 'changedPassword',
        text: 'changed the own password',
      });
    });
  }
}
