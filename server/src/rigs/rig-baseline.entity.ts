import {
  Check,
  Column,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  type Relation,
} from 'typeorm';
import { Capture } from '../captures/capture.entity';
import { Person } from '../people/person.entity';
import { BenchRecordRow } from '../records/record.entity';
import { Rig } from './rig.entity';

/** The rig measured without a unit: one record, held to when the capture is analysed again. */
@Entity('rig_baseline')
@Index('ix_rig_baseline_rig', ['rigId', 'createdAt'])
@Index('uq_rig_baseline_record', ['rigId', 'recordId', 'inputRange'], {
  unique: true,
  where: 'retired_at IS NULL',
})
@Check('ck_rig_baseline_retired', '(retired_at IS NULL) = (retired_by IS NULL)')
export class RigBaseline {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_rig_baseline' })
  readonly id!: string;

  @Column({ name: 'rig_id', type: 'uuid' })
  rigId!: string;

  @Column({ name: 'capture_id', type: 'uuid' })
  captureId!: string;

  /** The capture's newest record when it was named. */
  @Column({ name: 'record_id', type: 'uuid' })
  recordId!: string;

  /** The interface's range or gain setting, in words. */
  @Column({ name: 'input_range', type: 'text' })
  inputRange!: string;

  @Column({ name: 'sample_rate_hz', type: 'integer' })
  sampleRateHz!: number;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'created_by', type: 'uuid' })
  createdById!: string;

  @Column({ name: 'retired_at', type: 'timestamptz', precision: 3, nullable: true })
  retiredAt!: Date | null;

  @Column({ name: 'retired_by', type: 'uuid', nullable: true })
  retiredById!: string | null;

  @ManyToOne(() => Rig)
  @JoinColumn({ name: 'rig_id', foreignKeyConstraintName: 'fk_rig_baseline_rig' })
  rig?: Relation<Rig>;

  @ManyToOne(() => Capture)
  @JoinColumn({ name: 'capture_id', foreignKeyConstraintName: 'fk_rig_baseline_capture' })
  capture?: Relation<Capture>;

  @ManyToOne(() => BenchRecordRow)
  @JoinColumn({ name: 'record_id', foreignKeyConstraintName: 'fk_rig_baseline_record' })
  record?: Relation<BenchRecordRow>;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'created_by', foreignKeyConstraintName: 'fk_rig_baseline_creator' })
  createdBy?: Relation<Person>;

  @ManyToOne(() => Person, { nullable: true })
  @JoinColumn({ name: 'retired_by', foreignKeyConstraintName: 'fk_rig_baseline_retirer' })
  retiredBy?: Relation<Person> | null;
}
