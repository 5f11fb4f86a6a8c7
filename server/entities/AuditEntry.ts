import { Column, Entity, Index } from 'typeorm';
import { BaseRow } from './BaseRow.js';

/** Who did what when. Only ever added to; ids are plain, so that entries outlive what they speak of. */
@Entity('audit_entries')
@Index(['entityType', 'entityId', 'createdAt'])
@Index(['projectId', 'createdAt'])
export class AuditEntry extends BaseRow {
  @Column({ type: 'uuid', nullable: true })
  actorId!: string | null;

  @Column({ type: 'varchar', length: 120, nullable: true })
  actorName!: string | null;

  @Column({ type: 'uuid', nullable: true })
  projectId!: string | null;

  @Column({ type: 'varchar', length: 20 })
  entityType!: 'user' | 'project' | 'batch' | 'capture' | 'session' | 'mail';

  @Column({ type: 'uuid', nullable: true })
  entityId!: string | null;

  /** Verb in the past: `uploaded`, `decided`, `screened` … */
  @Column({ type: 'varchar', length: 40 })
  action!: string;

  @Column({ type: 'text' })
  text!: string;

  @Column({ type: 'jsonb', default: {} })
  details!: Record<string, unknown>;
}
