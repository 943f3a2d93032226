import { Column, Entity, PrimaryColumn } from 'typeorm';

/** A worker process that is alive: it renews its row, and the others look after it. */
@Entity('worker')
export class Worker {
  /** The queue's own id of the process: it stands on the jobs that the process holds. */
  @PrimaryColumn({ name: 'id', type: 'text', primaryKeyConstraintName: 'pk_worker' })
  id!: string;

  @Column({ name: 'started_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly startedAt!: Date;

  @Column({ name: 'seen_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  seenAt!: Date;
}
