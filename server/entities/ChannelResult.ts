import { Column, Entity, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import type { ChannelScreen, Verdict } from '../../shared/schemas/screening.js';
import type { MeasurementRecord } from '../../shared/screening/MeasurementRecord.js';
import { BaseRow } from './BaseRow.js';
import { Capture } from './Capture.js';

/** What was measured on one channel, and what the judge made of it. */
@Entity('channel_results')
@Unique(['captureId', 'channelIndex'])
export class ChannelResult extends BaseRow {
  @Column({ type: 'uuid' })
  captureId!: string;

  @ManyToOne(() => Capture, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'capture_id' })
  capture!: Relation<Capture>;

  @Column({ type: 'integer' })
  channelIndex!: number;

  /** Independent of any threshold: judging again needs only this. */
  @Column({ type: 'jsonb' })
  measurement!: MeasurementRecord;

  @Column({ type: 'jsonb' })
  screen!: ChannelScreen;

  @Column({ type: 'varchar', length: 12 })
  verdict!: Verdict;
}
