import { Column, Entity, Index } from 'typeorm';
import { BaseRow } from './BaseRow.js';

@Entity('projects')
export class Project extends BaseRow {
  @Index({ unique: true })
  @Column({ type: 'varchar', length: 120 })
  name!: string;

  @Column({ type: 'text', default: '' })
  description!: string;

  @Column({ type: 'boolean', default: false })
  isArchived!: boolean;
}
