import {
  Check,
  Column,
  Entity,
  Generated,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import { AnalysisJob } from '../jobs/analysis-job.entity';
import { Person } from '../people/person.entity';
import { BenchRecordRow } from '../records/record.entity';
import { Rig } from '../rigs/rig.entity';
import { bigintAsNumber, StoredObject } from '../storage/stored-object.entity';
import { UnitCondition } from '../units/unit-condition.entity';
import { Unit } from '../units/unit.entity';
import type { Take } from './take';

export const CAPTURE_STATES = ['queued', 'analysing', 'done', 'failed', 'cancelled'] as const;
export type CaptureState = (typeof CAPTURE_STATES)[number];

/** Something worth knowing about the file itself, found when it was uploaded. */
export interface FileWarning {
  readonly code: string;
  readonly message: string;
}

/** A recording: what it is never changes; how it is filed and how far its analysis is may. */
@Entity('capture')
@Unique('uq_capture_number', ['number'])
@Index('ix_capture_sha256', ['sha256', 'number'])
@Index('ix_capture_uploaded_at', ['uploadedAt', 'number'])
@Index('ix_capture_size_bytes', ['sizeBytes', 'number'])
@Index('ix_capture_duration_s', ['durationS', 'number'])
@Index('ix_capture_unit', ['unitId', 'number'])
@Index('ix_capture_condition', ['conditionId', 'number'])
@Index('ix_capture_rig', ['rigId', 'number'])
@Index('ix_capture_state', ['state', 'number'])
@Index('ix_capture_warnings', ['number'], { where: 'has_warnings' })
// These carry a collation or an operator class, which the entity can't express.
@Index('ix_capture_file_name', { synchronize: false })
@Index('ix_capture_unit_key', { synchronize: false })
@Index('ix_capture_measure', { synchronize: false })
@Index('ix_capture_search', { synchronize: false })
@Check('ck_capture_size_bytes', 'size_bytes > 0')
@Check('ck_capture_condition', 'condition_id IS NULL OR unit_id IS NOT NULL')
@Check('ck_capture_state', `state IN ('queued', 'analysing', 'done', 'failed', 'cancelled')`)
export class Capture {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_capture' })
  readonly id!: string;

  @Column({ name: 'number', type: 'integer' })
  @Generated('increment')
  readonly number!: number;

  @Column({ name: 'file_name', type: 'text' })
  fileName!: string;

  /** The name in lower case: sorting goes by it. */
  @Column({ name: 'file_name_key', type: 'text' })
  fileNameKey!: string;

  @Column({ name: 'sha256', type: 'text' })
  sha256!: string;

  @Column({ name: 'size_bytes', type: 'bigint', transformer: bigintAsNumber })
  sizeBytes!: number;

  @Column({ name: 'uploaded_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly uploadedAt!: Date;

  @Column({ name: 'uploaded_by', type: 'uuid' })
  uploadedById!: string;

  @Column({ name: 'note', type: 'text', default: '' })
  note!: string;

  @Column({ name: 'unit_id', type: 'uuid', nullable: true })
  unitId!: string | null;

  @Column({ name: 'condition_id', type: 'uuid', nullable: true })
  conditionId!: string | null;

  @Column({ name: 'rig_id', type: 'uuid', nullable: true })
  rigId!: string | null;

  @Column({ name: 'sample_rate_hz', type: 'integer' })
  sampleRateHz!: number;

  @Column({ name: 'channel_count', type: 'integer' })
  channelCount!: number;

  @Column({ name: 'bits_per_sample', type: 'integer' })
  bitsPerSample!: number;

  @Column({ name: 'sample_format', type: 'text' })
  sampleFormat!: string;

  @Column({ name: 'frame_count', type: 'bigint', transformer: bigintAsNumber })
  frameCount!: number;

  @Column({ name: 'duration_s', type: 'double precision' })
  durationS!: number;

  @Column({ name: 'file_warnings', type: 'json' })
  fileWarnings!: readonly FileWarning[];

  /** Null for an upload. */
  @Column({ name: 'take', type: 'json', nullable: true })
  take!: Take | null;

  /** A practice device was measured, by what the file or the take says: never evidence about a real unit. */
  @Column({ name: 'is_practice', type: 'boolean', default: false })
  isPractice!: boolean;

  @Column({ name: 'state', type: 'text', default: 'queued' })
  state!: CaptureState;

  @Column({ name: 'job_id', type: 'uuid', nullable: true })
  jobId!: string | null;

  @Column({ name: 'record_id', type: 'uuid', nullable: true })
  recordId!: string | null;

  /** The current record's measure; empty before there is one. */
  @Column({ name: 'measure', type: 'text', default: '' })
  measure!: string;

  @Column({ name: 'has_warnings', type: 'boolean', default: false })
  hasWarnings!: boolean;

  /** Maker, model and serial number in lower case, or nothing: sorting goes by it. */
  @Column({ name: 'unit_key', type: 'text', default: '' })
  unitKey!: string;

  /** Everything a search looks through, in lower case; see refreshFiling. */
  @Column({ name: 'search', type: 'text', default: '' })
  search!: string;

  @ManyToOne(() => StoredObject)
  @JoinColumn({ name: 'sha256', foreignKeyConstraintName: 'fk_capture_object' })
  object?: Relation<StoredObject>;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'uploaded_by', foreignKeyConstraintName: 'fk_capture_person' })
  uploadedBy?: Relation<Person>;

  @ManyToOne(() => Unit, { nullable: true })
  @JoinColumn({ name: 'unit_id', foreignKeyConstraintName: 'fk_capture_unit' })
  unit?: Relation<Unit> | null;

  @ManyToOne(() => UnitCondition, { nullable: true })
  @JoinColumn({ name: 'condition_id', foreignKeyConstraintName: 'fk_capture_condition' })
  condition?: Relation<UnitCondition> | null;

  @ManyToOne(() => Rig, { nullable: true })
  @JoinColumn({ name: 'rig_id', foreignKeyConstraintName: 'fk_capture_rig' })
  rig?: Relation<Rig> | null;

  @ManyToOne(() => AnalysisJob, { nullable: true })
  @JoinColumn({ name: 'job_id', foreignKeyConstraintName: 'fk_capture_job' })
  job?: Relation<AnalysisJob> | null;

  @ManyToOne(() => BenchRecordRow, { nullable: true })
  @JoinColumn({ name: 'record_id', foreignKeyConstraintName: 'fk_capture_record' })
  record?: Relation<BenchRecordRow> | null;
}
