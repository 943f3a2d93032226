import type { AnalysisSettings, MeasureId } from '@benchlark/dsp';
import {
  Check,
  Column,
  Entity,
  Index,
  JoinColumn,
  ManyToOne,
  PrimaryGeneratedColumn,
  Unique,
  type Relation,
} from 'typeorm';
import { Capture } from '../captures/capture.entity';
import { Person } from '../people/person.entity';

export const JOB_STATES = ['queued', 'running', 'done', 'failed', 'cancelled'] as const;
export type JobState = (typeof JOB_STATES)[number];

/** One analysis that was asked for. The queue only says when; this row says what, how far, and by which attempt. */
@Entity('analysis_job')
@Unique('uq_analysis_job_key', ['captureId', 'jobKey'])
@Index('ix_analysis_job_state', ['state', 'createdAt'])
@Check('ck_analysis_job_state', `state IN ('queued', 'running', 'done', 'failed', 'cancelled')`)
export class AnalysisJob {
  @PrimaryGeneratedColumn('uuid', { primaryKeyConstraintName: 'pk_analysis_job' })
  readonly id!: string;

  @Column({ name: 'capture_id', type: 'uuid' })
  captureId!: string;

  /** Hash of measure, settings and dsp version: asking for the same twice is one job. */
  @Column({ name: 'job_key', type: 'text' })
  jobKey!: string;

  @Column({ name: 'measure', type: 'text', nullable: true })
  measure!: MeasureId | null;

  @Column({ name: 'settings', type: 'json' })
  settings!: AnalysisSettings;

  @Column({ name: 'dsp_version', type: 'text' })
  dspVersion!: string;

  @Column({ name: 'priority', type: 'integer', default: 0 })
  priority!: number;

  @Column({ name: 'state', type: 'text', default: 'queued' })
  state!: JobState;

  @Column({ name: 'progress', type: 'double precision', default: 0 })
  progress!: number;

  /** Also the fence: only the attempt counted here may store a result. */
  @Column({ name: 'attempts', type: 'integer', default: 0 })
  attempts!: number;

  @Column({ name: 'max_attempts', type: 'integer' })
  maxAttempts!: number;

  @Column({ name: 'worker_id', type: 'text', nullable: true })
  workerId!: string | null;

  @Column({ name: 'failure_code', type: 'text', nullable: true })
  failureCode!: string | null;

  @Column({ name: 'failure_message', type: 'text', nullable: true })
  failureMessage!: string | null;

  @Column({ name: 'requested_by', type: 'uuid' })
  requestedById!: string;

  @Column({ name: 'created_at', type: 'timestamptz', precision: 3, default: () => 'now()' })
  readonly createdAt!: Date;

  @Column({ name: 'started_at', type: 'timestamptz', precision: 3, nullable: true })
  startedAt!: Date | null;

  @Column({ name: 'ended_at', type: 'timestamptz', precision: 3, nullable: true })
  endedAt!: Date | null;

  @ManyToOne(() => Capture)
  @JoinColumn({ name: 'capture_id', foreignKeyConstraintName: 'fk_analysis_job_capture' })
  capture?: Relation<Capture>;

  @ManyToOne(() => Person)
  @JoinColumn({ name: 'requested_by', foreignKeyConstraintName: 'fk_analysis_job_person' })
  requestedBy?: Relation<Person>;
}
