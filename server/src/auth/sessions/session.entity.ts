import {
  Column,
  CreateDateColumn,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
} from 'typeorm';
import { Person } from '../../people/person.entity';

/** A signed-in browser. The row decides on every request; deleting it ends the session. */
@Entity('session')
@Unique('uq_session_token_hash', ['tokenHash'])
export class Session {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_session' })
  readonly id!: string;

  @Index('ix_session_person')
  @Column({ name: 'person_id', type: 'uuid' })
  personId!: string;

  @ManyToOne(() => Person, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'person_id', foreignKeyConstraintName: 'fk_session_person' })
  person!: Person;

  /** SHA-256 of the opaque id that the cookie carries. */
  @Column({ name: 'token_hash', type: 'text' })
  tokenHash!: string;

  @Column({ name: 'user_agent', type: 'text' })
  userAgent!: string;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'last_seen_at', type: 'timestamptz', default: () => 'now()' })
  lastSeenAt!: Date;

  @Column({ name: 'expires_at', type: 'timestamptz' })
  expiresAt!: Date;
}
