import { Column, Entity, Index, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import type { ProjectRole } from '../../shared/schemas/account.js';
import { BaseRow } from './BaseRow.js';
import { Project } from './Project.js';
import { User } from './User.js';

@Entity('memberships')
@Unique(['projectId', 'userId'])
export class Membership extends BaseRow {
  @Column({ type: 'uuid' })
  projectId!: string;

  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'project_id' })
  project!: Relation<Project>;

  @Index()
  @Column({ type: 'uuid' })
  userId!: string;

  @ManyToOne(() => User, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'user_id' })
  user!: Relation<User>;

  @Column({ type: 'varchar', length: 20, array: true })
  roles!: ProjectRole[];
}
