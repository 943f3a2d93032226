import { Check, Column, Entity, PrimaryGeneratedColumn, Unique } from 'typeorm';

/** The chain around a unit: source, interface, cables, supply, load. */
@Entity('rig')
@Unique('uq_rig_name', ['name'])
@Check('ck_rig_limit_dbfs', 'limit_dbfs <= 0')
export class Rig {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_rig' })
  readonly id!: string;

  @Column({ name: 'name', type: 'text' })
  name!: string;

  @Column({ name: 'interface', type: 'text', default: '' })
  interface!: string;

  @Column({ name: 'source', type: 'text', default: '' })
  source!: string;

  @Column({ name: 'cables', type: 'text', default: '' })
  cables!: string;

  @Column({ name: 'supply', type: 'text', default: '' })
  supply!: string;

  @Column({ name: 'load', type: 'text', default: '' })
  load!: string;

  /** The highest level that may be played on it; null: none but full scale. */
  @Column({ name: 'limit_dbfs', type: 'double precision', nullable: true })
  limitDbfs!: number | null;

  @Column({ name: 'notes', type: 'text', default: '' })
  notes!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;
}
