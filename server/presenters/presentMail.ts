import type { MailMessageDto } from '../../shared/schemas/system.js';
import type { MailMessage } from '../entities/index.js';

/** Without the texts: they hold one-time links. */
export function presentMail(mail: MailMessage): MailMessageDto {
  return {
    id: mail.id,
    kind: mail.kind,
    recipient: mail.recipient,
    subject: mail.subject,
    state: mail.state,
    attempts: mail.attempts,
    lastError: mail.lastError,
    createdAt: mail.createdAt.toISOString(),
    sentAt: mail.sentAt?.toISOString() ?? null,
  };
}
