import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A live worker writes its time here every few seconds; readiness and the queue page read it. */
@Entity('worker_heartbeats')
export class WorkerHeartbeat {
  @PrimaryColumn({ type: 'varchar', length: 120 })
  workerId!: string;

  @Column({ type: 'timestamptz' })
  seenAt!: Date;

  @Column({ type: 'timestamptz' })
  startedAt!: Date;
}
