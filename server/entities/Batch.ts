import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { BatchState } from '../../shared/schemas/batch.js';
import { BaseRow } from './BaseRow.js';
import { Project } from './Project.js';
import { User } from './User.js';

@Entity('batches')
@Index(['projectId', 'createdAt'])
export class Batch extends BaseRow {
  @Column({ type: 'uuid' })
  projectId!: string;

  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'project_id' })
  project!: Relation<Project>;

  @Column({ type: 'varchar', length: 120 })
  name!: string;

  @Column({ type: 'varchar', length: 20, default: 'receiving' })
  state!: BatchState;

  @Column({ type: 'jsonb', default: {} })
  acquisition!: AcquisitionSheet;

  @Column({ type: 'uuid', nullable: true })
  createdById!: string | null;

  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'created_by_id' })
  createdBy!: Relation<User> | null;

  /** No more files after this. */
  @Column({ type: 'timestamptz', nullable: true })
  completedAt!: Date | null;

  /** Set once, in the statement that moves the batch from screening to review. */
  @Column({ type: 'timestamptz', nullable: true })
  screenedAt!: Date | null;
}
