import { Inject, Injectable } from '@nestjs/common';
import { DSP_VERSION } from '@benchlark/dsp';
import { DataSource, type EntityManager } from 'typeorm';
import { AppError } from '../common/app-error';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { AnalysisJob } from './analysis-job.entity';
import { jobKey, type AnalysisRequest } from './job-key';
import { announce, enqueueAnalysis } from './job-queue';

/** Asks for analyses: one row a request, however often it is made. */
@Injectable()
export class AnalysisRequests {
  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Env,
  ) {}

  /**
   * Enters the analysis and queues it, in the caller's transaction.
   *
   * @returns the job; `isNew` is false when the same analysis is done or under way already
   */
  async request(
    tx: EntityManager,
    wanted: AnalysisRequest & { captureId: string; requestedById: string; priority: number },
  ): Promise<{ jobId: string; isNew: boolean }> {
    const { captureId, measure, settings, requestedById, priority } = wanted;
    const key = jobKey({ measure, settings }, DSP_VERSION);
    const inserted = await tx.query<{ id: string }[]>(
      `INSERT INTO analysis_job (capture_id, job_key, measure, settings, dsp_version, priority, max_attempts, requested_by)
       VALUES ($1, $2, $3, $4, $5, $6, $7, $8) ON CONFLICT (capture_id, job_key) DO NOTHING RETURNING id`,
      [
        captureId,
        key,
        measure,
        JSON.stringify(settings),
        DSP_VERSION,
        priority,
        this.env.JOB_MAX_ATTEMPTS,
        requestedById,
      ],
    );
    const [row] = inserted;
    if (row) {
      await this.begin(tx, row.id, captureId, priority);
      return { jobId: row.id, isNew: true };
    }
    const job = await tx.findOneOrFail(AnalysisJob, {
      where: { captureId, jobKey: key },
      lock: { mode: 'pessimistic_write' },
    });
    if (job.state !== 'failed' && job.state !== 'cancelled') return { jobId: job.id, isNew: false };
    await this.restart(tx, job);
    return { jobId: job.id, isNew: true };
  }

  /** Tries a failed or cancelled analysis again. @throws AppError NOT_FOUND, CONFLICT */
  async retry(jobId: string): Promise<void> {
    await this.dataSource.transaction(async (tx) => {
      const job = await tx.findOne(AnalysisJob, {
        where: { id: jobId },
        lock: { mode: 'pessimistic_write' },
      });
      if (!job) throw new AppError('NOT_FOUND');
      if (job.state !== 'failed' && job.state !== 'cancelled') {
        throw new AppError('CONFLICT', {
          detail: `The analysis is ${job.state}; only a failed or cancelled one can be tried again.`,
        });
      }
      await this.restart(tx, job);
    });
  }

  /** Attempts go on counting: the number is also what keeps a late result of an earlier attempt out. */
  private async restart(tx: EntityManager, job: AnalysisJob): Promise<void> {
    await tx.update(
      AnalysisJob,
      { id: job.id },
      {
        state: 'queued',
        progress: 0,
        maxAttempts: job.attempts + this.env.JOB_MAX_ATTEMPTS,
        failureCode: null,
        failureMessage: null,
        workerId: null,
        startedAt: null,
        endedAt: null,
      },
    );
    await this.begin(tx, job.id, job.captureId, job.priority);
  }

  private async begin(tx: EntityManager, jobId: string, captureId: string, priority: number): Promise<void> {
    await tx.query(`UPDATE capture SET job_id = $1, state = 'queued' WHERE id = $2`, [jobId, captureId]);
    await enqueueAnalysis(tx, jobId, priority);
    await announce(tx, { captureId, state: 'queued', progress: 0 });
  }
}
