import { Column, Entity, Index } from 'typeorm';
import { BaseRow } from './BaseRow.js';

@Entity('users')
export class User extends BaseRow {
  /** Kept in lower case. */
  @Index({ unique: true })
  @Column({ type: 'varchar', length: 254 })
  email!: string;

  @Column({ type: 'varchar', length: 120 })
  name!: string;

  /** Null until the invitation is accepted. */
  @Column({ type: 'varchar', length: 100, nullable: true })
  passwordHash!: string | null;

  @Column({ type: 'boolean', default: false })
  isAdmin!: boolean;

  @Column({ type: 'boolean', default: true })
  isActive!: boolean;

  @Column({ type: 'timestamptz', nullable: true })
  lastSeenAt!: Date | null;
}
