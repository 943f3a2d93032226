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

@Entity('password_reset')
@Unique('uq_password_reset_token_hash', ['tokenHash'])
export class PasswordReset {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_password_reset' })
  readonly id!: string;

  @Index('ix_password_reset_person')
  @Column({ name: 'person_id', type: 'uuid' })
  personId!: string;

  @ManyToOne(() => Person, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'person_id', foreignKeyConstraintName: 'fk_password_reset_person' })
  person!: Person;

  @Column({ name: 'token_hash', type: 'text' })
  tokenHash!: string;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'expires_at', type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ name: 'used_at', type: 'timestamptz', nullable: true })
  usedAt!: Date | null;
}
