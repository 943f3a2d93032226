import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import { Unit } from './unit.entity';

/** The state a unit was measured in. */
@Entity('unit_condition')
@Unique('uq_unit_condition_name', ['unitId', 'name'])
export class UnitCondition {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_unit_condition' })
  readonly id!: string;

  @Column({ name: 'unit_id', type: 'uuid' })
  unitId!: string;

  @ManyToOne(() => Unit, (unit) => unit.conditions)
  @JoinColumn({ name: 'unit_id', foreignKeyConstraintName: 'fk_unit_condition_unit' })
  unit!: Relation<Unit>;

  @Column({ name: 'name', type: 'text' })
  name!: string;

  @Column({ name: 'notes', type: 'text', default: '' })
  notes!: string;

  /** Calendar date, YYYY-MM-DD. */
  @Column({ name: 'started_on', type: 'date', nullable: true })
  startedOn!: string | null;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;
}
