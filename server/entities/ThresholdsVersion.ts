import { Column, Entity, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import type { Thresholds } from '../../shared/schemas/thresholds.js';
import { BaseRow } from './BaseRow.js';
import { Project } from './Project.js';
import { User } from './User.js';

/** Thresholds are never changed, only followed by a new version; the highest is in force. */
@Entity('thresholds_versions')
@Unique(['projectId', 'version'])
export class ThresholdsVersion extends BaseRow {
  @Column({ type: 'uuid' })
  projectId!: string;

  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'project_id' })
  project!: Relation<Project>;

  @Column({ type: 'integer' })
  version!: number;

  @Column({ type: 'jsonb' })
  values!: Thresholds;

  @Column({ type: 'uuid', nullable: true })
  authorId!: string | null;

  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'author_id' })
  author!: Relation<User> | null;

  @Column({ type: 'text' })
  reason!: string;
}
