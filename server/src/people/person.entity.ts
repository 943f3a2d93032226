import { Check, Column, CreateDateColumn, Entity, PrimaryGeneratedColumn, Unique } from 'typeorm';

@Entity('person')
@Unique('uq_person_email', ['email'])
@Check('ck_person_email_lower', 'email = lower(email)')
export class Person {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_person' })
  readonly id!: string;

  @Column({ name: 'display_name', type: 'text' })
  displayName!: string;

  /** Kept in lower case; one account an address. */
  @Column({ name: 'email', type: 'text' })
  email!: string;

  /** argon2id in PHC form. */
  @Column({ name: 'password_hash', type: 'text' })
  passwordHash!: string;

  @Column({ name: 'is_disabled', type: 'boolean', default: false })
  isDisabled!: boolean;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'last_seen_at', type: 'timestamptz', nullable: true })
  lastSeenAt!: Date | null;
}
