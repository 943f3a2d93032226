import type { DataSource, EntityManager } from 'typeorm';
import { AnalysisJob } from './analysis-job.entity';
import { announce } from './job-queue';

export interface JobFailure {
  readonly code: string;
  readonly message: string;
}

type Attempt = Pick<AnalysisJob, 'id' | 'attempts' | 'captureId'>;

/**
 * Begins the next attempt at a job.
 *
 * @returns the job with its attempt counted, or null when there is nothing to do: it is over, or its tries are used up
 */
export async function claimJob(
  dataSource: DataSource,
  jobId: string,
  workerId: string,
): Promise<AnalysisJob | null> {
  return dataSource.transaction(async (tx) => {
    const job = await tx.findOne(AnalysisJob, { where: { id: jobId }, lock: { mode: 'pessimistic_write' } });
    if (!job || (job.state !== 'queued' && job.state !== 'running')) return null;
    if (job.attempts >= job.maxAttempts) {
      await markFailed(tx, job, {
        code: 'WORKER_LOST',
        message: `The analysis was begun ${job.attempts} times and never ended: the worker died each time.`,
      });
      return null;
    }
    const attempts = job.attempts + 1;
    await tx.query(
      `UPDATE analysis_job SET state = 'running', attempts = $2, worker_id = $3, progress = 0,
         started_at = coalesce(started_at, now()) WHERE id = $1`,
      [jobId, attempts, workerId],
    );
    await setCaptureState(tx, { ...job, attempts }, 'analysing');
    await announce(tx, { captureId: job.captureId, state: 'analysing', progress: 0 });
    return { ...job, state: 'running', attempts, workerId };
  });
}

/** Locks the job's row and says whether this attempt still is the one that counts. */
export async function lockAttempt(tx: EntityManager, { id, attempts }: Attempt): Promise<boolean> {
  const rows = await tx.query<unknown[]>(
    `SELECT 1 FROM analysis_job WHERE id = $1 AND attempts = $2 AND state = 'running' FOR UPDATE`,
    [id, attempts],
  );
  return rows.length > 0;
}

/** Notes how far an attempt is. @returns false when it no longer counts and should end */
export async function noteProgress(
  dataSource: DataSource,
  { id, attempts, captureId }: Attempt,
  progress: number,
): Promise<boolean> {
  const [rows] = await dataSource.query<[{ changed: boolean }[], number]>(
    `UPDATE analysis_job AS j SET progress = $3 FROM (SELECT id, progress FROM analysis_job WHERE id = $1) AS old
     WHERE j.id = old.id AND j.attempts = $2 AND j.state = 'running' RETURNING old.progress <> $3 AS changed`,
    [id, attempts, progress],
  );
  const [row] = rows;
  if (row?.changed) await announce(dataSource.manager, { captureId, state: 'analysing', progress });
  return row !== undefined;
}

/** Ends an attempt that failed for good. */
export async function failJob(dataSource: DataSource, job: Attempt, failure: JobFailure): Promise<void> {
  await dataSource.transaction(async (tx) => {
    if (await lockAttempt(tx, job)) await markFailed(tx, job, failure);
  });
}

/** Hands an attempt back to the queue; `isCounted` false leaves the job as many tries as it had. */
export async function releaseJob(
  dataSource: DataSource,
  job: Attempt,
  { isCounted, failure }: { isCounted: boolean; failure?: JobFailure },
): Promise<void> {
  await dataSource.transaction(async (tx) => {
    if (!(await lockAttempt(tx, job))) return;
    await tx.query(
      `UPDATE analysis_job SET state = 'queued', progress = 0, worker_id = NULL,
         max_attempts = max_attempts + $2, failure_code = $3, failure_message = $4 WHERE id = $1`,
      [job.id, isCounted ? 0 : 1, failure?.code ?? null, failure?.message ?? null],
    );
    await setCaptureState(tx, job, 'queued');
    await announce(tx, { captureId: job.captureId, state: 'queued', progress: 0 });
  });
}

async function markFailed(tx: EntityManager, job: Attempt, { code, message }: JobFailure): Promise<void> {
  await tx.query(
    `UPDATE analysis_job SET state = 'failed', failure_code = $2, failure_message = $3, ended_at = now() WHERE id = $1`,
    [job.id, code, message],
  );
  await setCaptureState(tx, job, 'failed');
  const failure = { code, message, attempts: job.attempts };
  await announce(tx, { captureId: job.captureId, state: 'failed', progress: null, failure });
}

/** A capture shows the state of the analysis that was asked for last. */
async function setCaptureState(tx: EntityManager, job: Attempt, state: string): Promise<void> {
  await tx.query('UPDATE capture SET state = $3 WHERE id = $1 AND job_id = $2', [
    job.captureId,
    job.id,
    state,
  ]);
}
