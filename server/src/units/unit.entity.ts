import { Check, Column, Entity, Index, OneToMany, PrimaryGeneratedColumn, type Relation } from 'typeorm';
import { UnitCondition } from './unit-condition.entity';

export const UNIT_KINDS = [
  'converter',
  'headphone-amplifier',
  'power-amplifier',
  'streamer',
  'phono-stage',
  'other',
] as const;
export type UnitKind = (typeof UNIT_KINDS)[number];

/** One physical device on the books. */
@Entity('unit')
@Index('ix_unit_search', { synchronize: false })
@Check(
  'ck_unit_kind',
  `kind IN ('converter', 'headphone-amplifier', 'power-amplifier', 'streamer', 'phono-stage', 'other')`,
)
export class Unit {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_unit' })
  readonly id!: string;

  @Column({ name: 'maker', type: 'text' })
  maker!: string;

  @Column({ name: 'model', type: 'text' })
  model!: string;

  @Column({ name: 'serial_number', type: 'text', nullable: true })
  serialNumber!: string | null;

  @Column({ name: 'kind', type: 'text', default: 'other' })
  kind!: UnitKind;

  @Column({ name: 'notes', type: 'text', default: '' })
  notes!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  /** Maker, model and serial number in lower case: what a search looks through, and how units are ordered. */
  @Column({ name: 'search', type: 'text' })
  search!: string;

  @OneToMany(() => UnitCondition, (condition) => condition.unit)
  conditions!: Relation<UnitCondition[]>;
}
