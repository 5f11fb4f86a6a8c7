import type { Transporter } from 'nodemailer';
import { LessThan, type DataSource } from 'typeorm';
import { MailMessage } from '../../server/entities/index.js';
import type { Logger } from '../../server/logging/createLogger.js';
import { classifyMailError } from './classifyMailError.js';
import { mailRetryDelayMs } from './mailRetryDelayMs.js';

const maxAttempts = 12;
/** Longer than the transport's time-outs together: a row older than this lost its sender. */
const abandonedAfterMs = 2 * 60_000;

export interface MailDependencies {
  dataSource: DataSource;
  transport: Transporter;
  from: string;
  logger: Logger;
}

/** Marks one due row as being sent, in one statement, so that two workers never take the same. */
async function claimNext(dataSource: DataSource): Promise<MailMessage | null> {
  const [rows] = (await dataSource.query(
    `UPDATE mail_messages SET state = 'sending', attempts = attempts + 1, next_attempt_at = now()
      WHERE id = (SELECT id FROM mail_messages WHERE state = 'pending' AND next_attempt_at <= now()
                   ORDER BY created_at FOR UPDATE SKIP LOCKED LIMIT 1)
      RETURNING id`,
  )) as [{ id: string }[], number];
  const claimed = rows[0];
  return claimed ? dataSource.getRepository(MailMessage).findOneBy({ id: claimed.id }) : null;
}

async function sendOne(message: MailMessage, { dataSource, transport, from, logger }: MailDependencies): Promise<void> {
  const repository = dataSource.getRepository(MailMessage);
  try {
    await transport.sendMail({
      from,
      // As an object: a comma in the text must never add a recipient.
      to: { name: '', address: message.recipient },
      subject: message.subject,
      text: message.text,
      html: message.html,
      messageId: message.messageId,
      headers: { 'Auto-Submitted': 'auto-generated' },
    });
    await repository.update(
      { id: message.id, state: 'sending' },
      { state: 'sent', sentAt: new Date(), lastError: null },
    );
    logger.info({ mailId: message.id, kind: message.kind }, 'mail sent');
  } catch (error) {
    const lastError = (error instanceof Error ? error.message : String(error)).slice(0, 500);
    const outcome = classifyMailError(error);
    const isLast = message.attempts >= maxAttempts;
    if (outcome === 'retry' && !isLast) {
      const nextAttemptAt = new Date(Date.now() + mailRetryDelayMs(message.attempts));
      await repository.update({ id: message.id, state: 'sending' }, { state: 'pending', nextAttemptAt, lastError });
      logger.warn({ mailId: message.id, attempts: message.attempts }, 'mail not sent, will try again');
      return;
    }
    const state = outcome === 'unknown' ? 'unknown' : 'failed';
    await repository.update({ id: message.id, state: 'sending' }, { state, lastError });
    logger.error({ mailId: message.id, state, lastError }, 'mail not sent');
  }
}

/**
 * Sends every mail that is due, one after another. Rows whose sender died are set to `unknown` for a person to decide:
 * sending again could deliver a second copy.
 * @returns the number of rows handled.
 */
export async function sendDueMail(dependencies: MailDependencies): Promise<number> {
  await dependencies.dataSource
    .getRepository(MailMessage)
    .update(
      { state: 'sending', nextAttemptAt: LessThan(new Date(Date.now() - abandonedAfterMs)) },
      { state: 'unknown', lastError: 'The worker stopped while this mail was being sent; it may have been delivered.' },
    );
  let handled = 0;
  for (
    let message = await claimNext(dependencies.dataSource);
    message;
    message = await claimNext(dependencies.dataSource)
  ) {
    await sendOne(message, dependencies);
    handled += 1;
  }
  return handled;
}
