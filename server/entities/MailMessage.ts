import { Column, Entity, Index } from 'typeorm';
import { BaseRow } from './BaseRow.js';

export type MailKind = 'batchScreened' | 'invitation' | 'passwordReset';
export type MailState = 'pending' | 'sending' | 'sent' | 'failed' | 'unknown';

/**
 * Outbox: written in the transaction of the event, sent by the worker. `dedupeKey` makes an event mail a person once.
 * A row found in `sending` after a crash becomes `unknown`: whether it left can't be decided by a machine.
 */
@Entity('mail_messages')
@Index(['state', 'nextAttemptAt'])
export class MailMessage extends BaseRow {
  @Index({ unique: true })
  @Column({ type: 'varchar', length: 200 })
  dedupeKey!: string;

  @Column({ type: 'varchar', length: 20 })
  kind!: MailKind;

  @Column({ type: 'varchar', length: 254 })
  recipient!: string;

  @Column({ type: 'varchar', length: 255 })
  subject!: string;

  @Column({ type: 'text' })
  text!: string;

  @Column({ type: 'text' })
  html!: string;

  /** Fixed Message-ID, so that a receiver can recognise a repetition. */
  @Column({ type: 'varchar', length: 200 })
  messageId!: string;

  @Column({ type: 'varchar', length: 10, default: 'pending' })
  state!: MailState;

  @Column({ type: 'integer', default: 0 })
  attempts!: number;

  @Column({ type: 'timestamptz', default: () => 'now()' })
  nextAttemptAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  sentAt!: Date | null;

  @Column({ type: 'text', nullable: true })
  lastError!: string | null;
}
