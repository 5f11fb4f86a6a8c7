import { Column, Entity, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import { BaseRow } from './BaseRow.js';
import { ChannelResult } from './ChannelResult.js';

export type SpectrumKind = 'survey' | 'fine';

/** One-sided densities from 0 Hz to the folding frequency as little-endian float32, linear. */
@Entity('spectra')
@Unique(['channelResultId', 'kind'])
export class Spectrum extends BaseRow {
  @Column({ type: 'uuid' })
  channelResultId!: string;

  @ManyToOne(() => ChannelResult, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'channel_result_id' })
  channelResult!: Relation<ChannelResult>;

  @Column({ type: 'varchar', length: 8 })
  kind!: SpectrumKind;

  @Column({ type: 'double precision' })
  resolutionHz!: number;

  @Column({ type: 'integer' })
  segments!: number;

  @Column({ type: 'bytea' })
  densityMean!: Buffer;

  @Column({ type: 'bytea', nullable: true })
  densityMedian!: Buffer | null;
}
