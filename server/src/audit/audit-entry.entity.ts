import { Column, Entity, PrimaryGeneratedColumn } from 'typeorm';

/** What happened, by whom, from where. The database refuses to change or delete a row. */
@Entity('audit_entry')
export class AuditEntry {
  // bigint reaches JavaScript as a string and stays one: it only orders and pages.
  @PrimaryGeneratedColumn('identity', {
    name: 'id',
    type: 'bigint',
    generatedIdentity: 'ALWAYS',
    primaryKeyConstraintName: 'pk_audit_entry',
  })
  readonly id!: string;

  /** By the database's clock. */
  @Column({ name: 'at', type: 'timestamptz', default: () => 'clock_timestamp()' })
  readonly at!: Date;

  @Column({ name: 'actor_id', type: 'uuid', nullable: true })
  actorId!: string | null;

  /** The name as it was then. */
  @Column({ name: 'actor_name', type: 'text', nullable: true })
  actorName!: string | null;

  @Column({ name: 'action', type: 'text' })
  action!: string;

  /** What it was done to, as `kind:id`. */
  @Column({ name: 'subject', type: 'text', nullable: true })
  subject!: string | null;

  @Column({ name: 'detail', type: 'text', nullable: true })
  detail!: string | null;

  @Column({ name: 'ip', type: 'text', nullable: true })
  ip!: string | null;

  @Column({ name: 'request_id', type: 'text', nullable: true })
  requestId!: string | null;
}
