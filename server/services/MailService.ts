import { In } from 'typeorm';
import type { AppDependencies } from '../AppDependencies.js';
import { MailMessage } from '../entities/index.js';
import type { MailState } from '../entities/MailMessage.js';
import { ConflictError, NotFoundError } from '../errors/index.js';
import type { Actor } from '../policies/Actor.js';
import { addAuditEntry } from './audit.js';

const listLimit = 200;

export class MailService {
  constructor(private readonly deps: Pick<AppDependencies, 'dataSource' | 'now'>) {}

  /** The newest mails of the outbox. */
  list(state: MailState | undefined): Promise<MailMessage[]> {
    return this.deps.dataSource.manager.find(MailMessage, {
      where: state ? { state } : {},
      order: { createdAt: 'DESC', id: 'ASC' },
      take: listLimit,
    });
  }

  /** A person decides that a mail is to be sent again; it keeps its Message-ID. */
  async resend(actor: Actor, mailId: string): Promise<void> {
    await this.deps.dataSource.transaction(async (manager) => {
      const mail = await manager.findOneBy(MailMessage, { id: mailId });
      if (!mail) throw new NotFoundError();
      const updated = await manager.update(
        MailMessage,
        { id: mailId, state: In(['failed', 'unknown']) },
        { state: 'pending', attempts: 0, nextAttemptAt: this.deps.now(), lastError: null },
      );
      if (updated.affected !== 1) {
        throw new ConflictError('NOT_RESENDABLE', 'Only a mail that failed, or whose fate is unknown, is sent again.');
      }
      await addAuditEntry(manager, {
        actor,
        entityType: 'mail',
        entityId: mailId,
        action: 'resent',
        text: `asked to send "${mail.subject}" to ${mail.recipient} again`,
        details: { before: mail.state },
      });
    });
  }
}
