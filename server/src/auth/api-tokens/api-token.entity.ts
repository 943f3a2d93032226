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

/** A person's key for the command line; it has that person's roles, as they are at the moment of use. */
@Entity('api_token')
@Unique('uq_api_token_token_hash', ['tokenHash'])
export class ApiToken {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_api_token' })
  readonly id!: string;

  @Index('ix_api_token_person')
  @Column({ name: 'person_id', type: 'uuid' })
  personId!: string;

  @ManyToOne(() => Person, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'person_id', foreignKeyConstraintName: 'fk_api_token_person' })
  person!: Person;

  @Column({ name: 'name', type: 'text' })
  name!: string;

  @Column({ name: 'token_hash', type: 'text' })
  tokenHash!: string;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'last_used_at', type: 'timestamptz', nullable: true })
  lastUsedAt!: Date | null;
}
