import { Check, Entity, JoinColumn, ManyToOne, PrimaryColumn } from 'typeorm';
import type { Role } from '../common/roles';
import { Person } from './person.entity';

@Entity('person_role')
@Check('ck_person_role_role', `role IN ('technician', 'reviewer', 'peer', 'administrator', 'reader')`)
export class PersonRole {
  @PrimaryColumn({ name: 'person_id', type: 'uuid', primaryKeyConstraintName: 'pk_person_role' })
  personId!: string;

  @PrimaryColumn({ name: 'role', type: 'text', primaryKeyConstraintName: 'pk_person_role' })
  role!: Role;

  @ManyToOne(() => Person, { onDelete: 'CASCADE' })
  @JoinColumn({ name: 'person_id', foreignKeyConstraintName: 'fk_person_role_person' })
  person!: Person;
}
