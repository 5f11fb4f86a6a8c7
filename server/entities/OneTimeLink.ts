import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import { BaseRow } from './BaseRow.js';
import { User } from './User.js';

export type OneTimeLinkKind = 'invitation' | 'passwordReset';

/** A link in an e-mail that buys one password. Only the hash of its token is kept. */
@Entity('one_time_links')
export class OneTimeLink extends BaseRow {
  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'user_id' })
  user!: Relation<User>;

  @Column({ type: 'varchar', length: 20 })
  kind!: OneTimeLinkKind;

  @Index({ unique: true })
  @Column({ type: 'char', length: 64 })
  tokenHash!: string;

  @Column({ type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  usedAt!: Date | null;
}
