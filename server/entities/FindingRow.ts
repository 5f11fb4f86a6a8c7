import { Column, Entity, Index, JoinColumn, ManyToOne, type Relation } from 'typeorm';
import type { Finding, FindingKind, FindingSeverity } from '../../shared/schemas/screening.js';
import { BaseRow } from './BaseRow.js';
import { Capture } from './Capture.js';

/** A finding as a row of its own, for filters and counts; the whole of it is in `finding`. */
@Entity('findings')
@Index(['captureId', 'channelIndex', 'position'])
@Index(['kind'])
export class FindingRow extends BaseRow {
  @Column({ type: 'uuid' })
  captureId!: string;

  @ManyToOne(() => Capture, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'capture_id' })
  capture!: Relation<Capture>;

  @Column({ type: 'integer' })
  channelIndex!: number;

  /** Order in the channel's list, gravest first. */
  @Column({ type: 'integer' })
  position!: number;

  @Column({ type: 'varchar', length: 40 })
  kind!: FindingKind;

  @Column({ type: 'varchar', length: 12 })
  severity!: FindingSeverity;

  @Column({ type: 'real' })
  confidence!: number;

  @Column({ type: 'double precision', nullable: true })
  frequencyHz!: number | null;

  @Column({ type: 'jsonb' })
  finding!: Finding;
}
