import type { AnalysisSettings } from '@benchlark/dsp';
import {
  Column,
  Entity,
  JoinColumn,
  ManyToOne,
  OneToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import { Capture } from '../captures/capture.entity';
import { AnalysisJob } from '../jobs/analysis-job.entity';

/** The figure that a list shows for a record. */
export interface MainFigure {
  readonly key: string;
  readonly value: number;
  readonly unit: string;
  readonly channel: string;
  readonly limitBy: string | null;
  readonly marginDb: number | null;
}

/** One analysis of one capture. A trigger refuses every change: a newer record supersedes, and both stay. */
@Entity('record')
@Unique('uq_record_ordinal', ['captureId', 'ordinal'])
@Unique('uq_record_job', ['jobId'])
@Unique('uq_record_supersedes', ['supersedesId'])
export class BenchRecordRow {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_record' })
  readonly id!: string;

  @Column({ name: 'capture_id', type: 'uuid' })
  captureId!: string;

  @Column({ name: 'job_id', type: 'uuid' })
  jobId!: string;

  @Column({ name: 'ordinal', type: 'integer' })
  ordinal!: number;

  @Column({ name: 'measure', type: 'text' })
  measure!: string;

  @Column({ name: 'dsp_version', type: 'text' })
  dspVersion!: string;

  /** What was asked for, as opposed to what the measure used: with it the record can be computed again. */
  @Column({ name: 'settings', type: 'json' })
  settings!: AnalysisSettings;

  /** The record as the contract has it, kept as text; a trace in it is its hash, points and units. */
  @Column({ name: 'content', type: 'json' })
  content!: object;

  @Column({ name: 'supersedes_id', type: 'uuid', nullable: true })
  supersedesId!: string | null;

  @Column({ name: 'main_figure', type: 'json', nullable: true })
  mainFigure!: MainFigure | null;

  @Column({ name: 'sketch', type: 'json' })
  sketch!: readonly (readonly number[])[];

  @Column({ name: 'warning_count', type: 'integer' })
  warningCount!: number;

  @Column({ name: 'recognised_as', type: 'text', nullable: true })
  recognisedAs!: string | null;

  @Column({ name: 'stimulus_name', type: 'text', nullable: true })
  stimulusName!: string | null;

  @Column({ name: 'fundamental_frequency_hz', type: 'double precision', nullable: true })
  fundamentalFrequencyHz!: number | null;

  @Column({ name: 'fundamental_level_dbfs', type: 'double precision', nullable: true })
  fundamentalLevelDbfs!: number | null;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  @ManyToOne(() => Capture)
  @JoinColumn({ name: 'capture_id', foreignKeyConstraintName: 'fk_record_capture' })
  capture?: Relation<Capture>;

  @OneToOne(() => AnalysisJob)
  @JoinColumn({ name: 'job_id', foreignKeyConstraintName: 'fk_record_job' })
  job?: Relation<AnalysisJob>;

  @OneToOne(() => BenchRecordRow, { nullable: true })
  @JoinColumn({ name: 'supersedes_id', foreignKeyConstraintName: 'fk_record_supersedes' })
  supersedes?: Relation<BenchRecordRow> | null;
}
