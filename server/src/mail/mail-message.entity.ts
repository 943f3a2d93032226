import { Check, Column, CreateDateColumn, Entity, Index, PrimaryGeneratedColumn } from 'typeorm';

export type MailState = 'queued' | 'sending' | 'sent' | 'failed';

/** One mail on its way out. Its text is sealed, because it can hold a link that lets somebody in, and erased once sent. */
@Entity('mail_message')
@Check('ck_mail_message_state', `state IN ('queued', 'sending', 'sent', 'failed')`)
@Index('ix_mail_message_due', ['dueAt'], { where: `state IN ('queued', 'sending')` })
export class MailMessage {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_mail_message' })
  readonly id!: string;

  @Column({ name: 'recipient', type: 'text' })
  recipient!: string;

  @Column({ name: 'subject', type: 'text' })
  subject!: string;

  @Column({ name: 'sealed_text', type: 'bytea', nullable: true })
  sealedText!: Buffer | null;

  @Column({ name: 'state', type: 'text', default: 'queued' })
  state!: MailState;

  @Column({ name: 'attempts', type: 'integer', default: 0 })
  attempts!: number;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  /** When to try next; while it is being sent, when somebody else may take it over. */
  @Column({ name: 'due_at', type: 'timestamptz', default: () => 'now()' })
  dueAt!: Date;

  @Column({ name: 'last_error', type: 'text', nullable: true })
  lastError!: string | null;
}
