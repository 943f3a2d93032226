import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { AnalysisJob, type JobState } from './analysis-job.entity';
import type { JobDto, ListJobsQuery } from './dto/job.dto';
import { announce, dequeueAnalysis } from './job-queue';

const LIST_LENGTH = 100;

interface JobRow {
  id: string;
  captureId: string;
  captureNumber: number;
  state: JobState;
  progress: number;
  attempts: number;
  maxAttempts: number;
  failureCode: string | null;
  failureMessage: string | null;
  createdAt: Date;
  startedAt: Date | null;
  endedAt: Date | null;
}

/** Analyses as people see them: what waits, runs, failed. */
@Injectable()
export class JobsService {
  constructor(private readonly dataSource: DataSource) {}

  async list({ state, limit = LIST_LENGTH }: ListJobsQuery): Promise<JobDto[]> {
    const rows = await this.dataSource.query<JobRow[]>(
      `SELECT j.id, j.capture_id AS "captureId", c.number AS "captureNumber", j.state, j.progress, j.attempts,
         j.max_attempts AS "maxAttempts", j.failure_code AS "failureCode", j.failure_message AS "failureMessage",
         j.created_at AS "createdAt", j.started_at AS "startedAt", j.ended_at AS "endedAt"
       FROM analysis_job AS j JOIN capture AS c ON c.id = j.capture_id
       WHERE $1::text IS NULL OR j.state = $1 ORDER BY j.created_at DESC, j.id LIMIT $2`,
      [state ?? null, limit],
    );
    return rows.map(toJobDto);
  }

  /**
   * Cancels an analysis that waits or runs; a running one is ended within a second.
   *
   * @throws AppError NOT_FOUND; CONFLICT when it is over
   */
  async cancel(jobId: string): Promise<void> {
    await this.dataSource.transaction(async (tx) => {
      const job = await tx.findOne(AnalysisJob, {
        where: { id: jobId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!job) throw new AppError('NOT_FOUND');
      if (job.state !== 'queued' && job.state !== 'running') {
        throw new AppError('CONFLICT', { detail: `The analysis is ${job.state} already.` });
      }
      await tx.query(`UPDATE analysis_job SET state = 'cancelled', ended_at = now() WHERE id = $1`, [jobId]);
      const [captures] = await tx.query<[{ state: string }[], number]>(
        `UPDATE capture SET state = CASE WHEN record_id IS NULL THEN 'cancelled' ELSE 'done' END
         WHERE job_id = $1 RETURNING state`,
        [jobId],
      );
      await dequeueAnalysis(tx, jobId);
      const [capture] = captures;
      if (capture) await announce(tx, { captureId: job.captureId, state: capture.state, progress: null });
    });
  }
}

function toJobDto({ failureCode, failureMessage, ...row }: JobRow): JobDto {
  return {
    ...row,
    kind: 'analysis',
    failure:
      failureCode === null
        ? null
        : { code: failureCode, message: failureMessage ?? '', attempts: row.attempts },
    createdAt: row.createdAt.toISOString(),
    startedAt: row.startedAt?.toISOString() ?? null,
    endedAt: row.endedAt?.toISOString() ?? null,
  };
}
