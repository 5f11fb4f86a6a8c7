import { Column, Entity, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import type { DecisionKind } from '../../shared/schemas/decision.js';
import { BaseRow } from './BaseRow.js';
import { Capture } from './Capture.js';
import { User } from './User.js';

/** Decisions are kept, never changed: the highest version of a capture is in force. */
@Entity('decisions')
@Unique(['captureId', 'version'])
export class Decision extends BaseRow {
  @Column({ type: 'uuid' })
  captureId!: string;

  @ManyToOne(() => Capture, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'capture_id' })
  capture!: Relation<Capture>;

  @Column({ type: 'integer' })
  version!: number;

  @Column({ type: 'varchar', length: 12 })
  decision!: DecisionKind;

  @Column({ type: 'double precision', nullable: true })
  limitHz!: number | null;

  @Column({ type: 'text' })
  reason!: string;

  @Column({ type: 'uuid' })
  decidedById!: string;

  @ManyToOne(() => User, { onDelete: 'RESTRICT' })
  @JoinColumn({ name: 'decided_by_id' })
  decidedBy!: Relation<User>;
}
