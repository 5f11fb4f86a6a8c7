import { randomUUID } from 'node:crypto';
import type { EntityManager } from 'typeorm';
import { MailMessage, type MailKind } from '../entities/MailMessage.js';
import type { MailContent } from './MailContent.js';

export interface OutgoingMail extends MailContent {
  /** Event, kind and recipient: a second mail with the same key is not written. */
  dedupeKey: string;
  kind: MailKind;
  recipient: string;
}

const singleLine = (text: string): string => text.replace(/[\r\n\t]+/g, ' ').slice(0, 255);

/**
 * Puts a mail into the outbox, in the transaction of the event that asks for it; the worker sends it.
 * @returns false when a mail with this key is there already
 */
export async function queueMail(manager: EntityManager, mail: OutgoingMail): Promise<boolean> {
  const inserted = await manager
    .createQueryBuilder()
    .insert()
    .into(MailMessage)
    .values({
      dedupeKey: mail.dedupeKey,
      kind: mail.kind,
      recipient: mail.recipient,
      subject: singleLine(mail.subject),
      text: mail.text,
      html: mail.html,
      messageId: `<${randomUUID()}@overfold>`,
    })
    .orIgnore()
    .returning('id')
    .execute();
  return inserted.raw.length > 0;
}
