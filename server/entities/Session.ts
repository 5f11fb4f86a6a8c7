import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import { BaseRow } from './BaseRow.js';
import { User } from './User.js';

/** One sign-in. Looked up on every request, so that sign-out and deactivation act at once. */
@Entity('sessions')
export class Session extends BaseRow {
  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'user_id' })
  user!: Relation<User>;

  /** SHA-256 of the renewal token in force. */
  @Index({ unique: true })
  @Column({ type: 'char', length: 64 })
  renewalHash!: string;

  /** The token before: within a short grace it renews again (two tabs), after that its use ends the session. */
  @Index()
  @Column({ type: 'char', length: 64, nullable: true })
  previousRenewalHash!: string | null;

  @Column({ type: 'timestamptz', nullable: true })
  rotatedAt!: Date | null;

  @Column({ type: 'timestamptz' })
  lastUsedAt!: Date;

  @Column({ type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ type: 'timestamptz', nullable: true })
  revokedAt!: Date | null;
}
