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
import { Person } from '../people/person.entity';
import { Rig } from './rig.entity';

export const CALIBRATION_CHANNELS = ['left', 'right', 'all'] as const;
export type CalibrationChannel = (typeof CALIBRATION_CHANNELS)[number];

export const CALIBRATION_DIRECTIONS = ['input', 'output'] as const;
export type CalibrationDirection = (typeof CALIBRATION_DIRECTIONS)[number];

/** Volts at digital full scale, as they were once measured. A trigger refuses every change but retiring it once. */
@Entity('rig_calibration')
@Index('ix_rig_calibration_rig', ['rigId', 'takenOn'])
@Check('ck_rig_calibration_channel', `channel IN ('left', 'right', 'all')`)
@Check('ck_rig_calibration_direction', `direction IN ('input', 'output')`)
@Check('ck_rig_calibration_volts', 'volts_rms_at_full_scale > 0')
@Check('ck_rig_calibration_divider', 'divider_ratio >= 1')
@Check('ck_rig_calibration_uncertainty', 'meter_uncertainty_percent >= 0')
@Check('ck_rig_calibration_validity', 'valid_until >= taken_on')
@Check('ck_rig_calibration_retired', '(retired_at IS NULL) = (retired_by IS NULL)')
export class RigCalibration {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_rig_calibration' })
  readonly id!: string;

  @Column({ name: 'rig_id', type: 'uuid' })
  rigId!: string;

  @Column({ name: 'channel', type: 'text' })
  channel!: CalibrationChannel;

  @Column({ name: 'direction', type: 'text' })
  direction!: CalibrationDirection;

  /** The interface's range or gain setting, in words. */
  @Column({ name: 'range', type: 'text' })
  range!: string;

  @Column({ name: 'sample_rate_hz', type: 'integer' })
  sampleRateHz!: number;

  /** Of the tone it was made with. */
  @Column({ name: 'frequency_hz', type: 'double precision' })
  frequencyHz!: number;

  /** At the interface's own terminals, for a sine that reads 0 dBFS. */
  @Column({ name: 'volts_rms_at_full_scale', type: 'double precision' })
  voltsRmsAtFullScale!: number;

  /** Of a divider between the unit and the interface; 1: none. */
  @Column({ name: 'divider_ratio', type: 'double precision', default: 1 })
  dividerRatio!: number;

  @Column({ name: 'load_ohm', type: 'double precision', nullable: true })
  loadOhm!: number | null;

  @Column({ name: 'meter', type: 'text' })
  meter!: string;

  /** Expanded, k = 2. */
  @Column({ name: 'meter_uncertainty_percent', type: 'double precision' })
  meterUncertaintyPercent!: number;

  /** Calendar date, YYYY-MM-DD. */
  @Column({ name: 'taken_on', type: 'date' })
  takenOn!: string;

  /** The last day on which it holds, YYYY-MM-DD. */
  @Column({ name: 'valid_until', type: 'date' })
  validUntil!: string;

  @Column({ name: 'notes', type: 'text', default: '' })
  notes!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'created_by', type: 'uuid' })
  createdById!: string;

  @Column({ name: 'retired_at', type: 'timestamptz', precision: 3, nullable: true })
  retiredAt!: Date | null;

  @Column({ name: 'retired_by', type: 'uuid', nullable: true })
  retiredById!: string | null;

  @ManyToOne(() => Rig)
  @JoinColumn({ name: 'rig_id', foreignKeyConstraintName: 'fk_rig_calibration_rig' })
  rig?: Relation<Rig>;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'created_by', foreignKeyConstraintName: 'fk_rig_calibration_creator' })
  createdBy?: Relation<Person>;

  @ManyToOne(() => Person, { nullable: true })
  @JoinColumn({ name: 'retired_by', foreignKeyConstraintName: 'fk_rig_calibration_retirer' })
  retiredBy?: Relation<Person> | null;
}
