import {
  Check,
  Column,
  CreateDateColumn,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
} from 'typeorm';
import type { Role } from '../common/roles';
import { Person } from '../people/person.entity';

@Entity('invitation')
@Unique('uq_invitation_token_hash', ['tokenHash'])
@Check(
  'ck_invitation_roles',
  `cardinality(roles) > 0 AND roles <@ ARRAY['technician', 'reviewer', 'peer', 'administrator', 'reader']`,
)
export class Invitation {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_invitation' })
  readonly id!: string;

  @Column({ name: 'token_hash', type: 'text' })
  tokenHash!: string;

  /** The only address that may accept; null for a link that was handed over some other way. */
  @Column({ name: 'email', type: 'text', nullable: true })
  email!: string | null;

  @Column({ name: 'roles', type: 'text', array: true })
  roles!: Role[];

  @Column({ name: 'invited_by_id', type: 'uuid' })
  invitedById!: string;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'invited_by_id', foreignKeyConstraintName: 'fk_invitation_invited_by' })
  invitedBy!: Person;

  @CreateDateColumn({ name: 'created_at', type: 'timestamptz', default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'expires_at', type: 'timestamptz' })
  expiresAt!: Date;

  @Column({ name: 'accepted_at', type: 'timestamptz', nullable: true })
  acceptedAt!: Date | null;

  @Column({ name: 'revoked_at', type: 'timestamptz', nullable: true })
  revokedAt!: Date | null;
}
