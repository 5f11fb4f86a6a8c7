import { Column, Entity, Index, JoinColumn, ManyToOne, Unique, type Relation } from 'typeorm';
import type { AcquisitionSheet } from '../../shared/schemas/acquisitionSheet.js';
import type { CaptureFormat, CaptureState } from '../../shared/schemas/capture.js';
import type { CsvLayout } from '../../shared/schemas/csvLayout.js';
import type { Verdict } from '../../shared/schemas/screening.js';
import { BaseRow } from './BaseRow.js';
import { Batch } from './Batch.js';
import { Project } from './Project.js';
import { User } from './User.js';

/** One uploaded file and where it stands. The row is the truth; the queue's job only a hint to work on it. */
@Entity('captures')
@Unique(['batchId', 'fileName'])
@Index(['batchId', 'createdAt', 'id'])
@Index(['projectId', 'state'])
@Index(['projectId', 'sha256'])
@Index(['state', 'queuedAt'])
@Index(['companionId'])
@Index(['projectId'], { where: '"companion_note" IS NOT NULL' })
// Over expressions, which a decorator can't say: made in the migration IndexReviewOrders.
@Index('IDX_captures_review_fold_score', { synchronize: false })
@Index('IDX_captures_review_created_at', { synchronize: false })
@Index('IDX_captures_review_clear_to', { synchronize: false })
@Index('IDX_captures_review_file_name', { synchronize: false })
@Index('IDX_captures_review_project', { synchronize: false })
export class Capture extends BaseRow {
  @Column({ type: 'uuid' })
  batchId!: string;

  @ManyToOne(() => Batch, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'batch_id' })
  batch!: Relation<Batch>;

  @Column({ type: 'uuid' })
  projectId!: string;

  @ManyToOne(() => Project, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'project_id' })
  project!: Relation<Project>;

  /** As uploaded, with its folder; never used as a path on disk. */
  @Column({ type: 'varchar', length: 1024 })
  fileName!: string;

  @Column({ type: 'varchar', length: 8 })
  format!: CaptureFormat;

  @Column({ type: 'bigint', transformer: { to: (value: number) => value, from: (value: string) => Number(value) } })
  sizeBytes!: number;

  @Column({ type: 'char', length: 64 })
  sha256!: string;

  @Column({ type: 'varchar', length: 120 })
  storageKey!: string;

  @Column({ type: 'varchar', length: 12, default: 'received' })
  state!: CaptureState;

  /** Values set for this file; they override the batch's. */
  @Column({ type: 'jsonb', default: {} })
  acquisition!: AcquisitionSheet;

  @Column({ type: 'jsonb', nullable: true })
  csvLayout!: CsvLayout | null;

  /** Fence: raised for every new job; a worker that still holds an older attempt may not write. */
  @Column({ type: 'integer', default: 0 })
  attempt!: number;

  /** Times a worker died on it or a passing fault stopped it, since the last retry by a person. */
  @Column({ type: 'integer', default: 0 })
  faultCount!: number;

  @Column({ type: 'real', default: 0 })
  progress!: number;

  @Column({ type: 'timestamptz', nullable: true })
  queuedAt!: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  startedAt!: Date | null;

  @Column({ type: 'timestamptz', nullable: true })
  screenedAt!: Date | null;

  @Column({ type: 'varchar', length: 40, nullable: true })
  failureCode!: string | null;

  @Column({ type: 'text', nullable: true })
  failureMessage!: string | null;

  @Column({ type: 'integer', nullable: true })
  failureLine!: number | null;

  @Column({ type: 'varchar', length: 12, nullable: true })
  verdict!: Verdict | null;

  @Column({ type: 'double precision', nullable: true })
  foldScore!: number | null;

  @Column({ type: 'double precision', nullable: true })
  clearToHz!: number | null;

  @Column({ type: 'text', nullable: true })
  headline!: string | null;

  @Column({ type: 'double precision', nullable: true })
  sampleRateHz!: number | null;

  @Column({ type: 'double precision', nullable: true })
  durationS!: number | null;

  @Column({ type: 'integer', nullable: true })
  channelCount!: number | null;

  @Column({ type: 'varchar', length: 20, nullable: true })
  engineVersion!: string | null;

  @Column({ type: 'integer', nullable: true })
  thresholdsVersion!: number | null;

  @Column({ type: 'uuid', nullable: true })
  uploadedById!: string | null;

  @ManyToOne(() => User, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'uploaded_by_id' })
  uploadedBy!: Relation<User> | null;

  /** Same bytes, uploaded to this project before. */
  @Column({ type: 'uuid', nullable: true })
  duplicateOfId!: string | null;

  /** The capture of the same event at another rate that the last screening was given, or would have been (see the note). */
  @Column({ type: 'uuid', nullable: true })
  companionId!: string | null;

  @ManyToOne(() => Capture, { onDelete: 'SET NULL', nullable: true })
  @JoinColumn({ name: 'companion_id' })
  companion!: Relation<Capture> | null;

  /** Names what of the companion the results rest on (`companionBasis`); null where it was not opened. */
  @Column({ type: 'char', length: 64, nullable: true })
  companionBasis!: string | null;

  /** Why the sheet's companion was not compared; null where it was, or where none is asked for. */
  @Column({ type: 'text', nullable: true })
  companionNote!: string | null;

  /** Raised by each decision; the reviewer states the one they saw. */
  @Column({ type: 'integer', default: 0 })
  decisionVersion!: number;
}
