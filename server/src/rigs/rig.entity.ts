import { Column, Entity, PrimaryGeneratedColumn, Unique } from 'typeorm';

/** The chain around a unit: source, interface, cables, supply, load. */
@Entity('rig')
@Unique('uq_rig_name', ['name'])
export class Rig {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_rig' })
  readonly id!: string;

  @Column({ name: 'name', type: 'text' })
  name!: string;

  @Column({ name: 'notes', type: 'text', default: '' })
  notes!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;
}
