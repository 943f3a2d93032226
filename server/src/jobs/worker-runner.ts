import { Inject, Injectable, Logger as NestLogger } from '@nestjs/common';
import { Logger, parseCronItems, run, type Runner, type WorkerEvents } from 'graphile-worker';
import { EventEmitter } from 'node:events';
import { Pool } from 'pg';
import { z } from 'zod';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { SweepService } from '../storage/sweep.service';
import { AnalysisTask } from './analysis.task';
import { Heartbeat } from './heartbeat.service';
import { ANALYSE_TASK } from './job-queue';

const payloadSchema = z.object({ jobId: z.uuid() });
const POLL_MS = 2_000;
const WATCH_MS = 3_000;
/** Several times the interval at which the queue asks by itself. */
const LYING_AFTER_S = 8;
const READY_JOBS = `SELECT EXISTS (SELECT 1 FROM graphile_worker._private_jobs
  WHERE locked_at IS NULL AND attempts < max_attempts AND run_at < now() - $1 * interval '1 second') AS "isLying"`;

/** Runs the queue in this process: analyses, the scheduled check of all evidence, and the sweep. */
@Injectable()
export class WorkerRunner {
  readonly #logger = new NestLogger('Worker');
  readonly #ending = new AbortController();
  #runner: Runner | null = null;
  #pool: Pool | null = null;
  #workerId = '';
  #watch: NodeJS.Timeout | undefined;
  /** Tasks that run now. */
  #active = 0;

  constructor(
    private readonly analysis: AnalysisTask,
    private readonly heartbeat: Heartbeat,
    private readonly sweep: SweepService,
    @Inject(ENV) private readonly env: Env,
  ) {}

  async start(): Promise<void> {
    await this.begin();
    await this.heartbeat.start(() => this.#workerId);
    this.#watch = setInterval(() => void this.lookAtQueue(), WATCH_MS);
    this.#logger.log(`worker ${this.#workerId} takes ${this.env.WORKER_CONCURRENCY} job(s) at a time`);
  }

  private async begin(): Promise<void> {
    const events = new EventEmitter() as WorkerEvents;
    events.on('pool:create', ({ workerPool }) => (this.#workerId = workerPool.id));
    const pool = new Pool({
      connectionString: this.env.DATABASE_URL,
      max: this.env.WORKER_CONCURRENCY + 3,
      application_name: 'benchlark-queue',
      connectionTimeoutMillis: 3_000,
    });
    pool.on('error', (error) => this.#logger.warn(`the queue's connection was lost: ${error.message}`));
    // A connection that breaks while it is lent out says so itself; without a listener that would end the process.
    pool.on('connect', (client) =>
      client.on('error', (error) => this.#logger.warn(`a connection broke: ${error.message}`)),
    );
    this.#pool = pool;
    this.#runner = await run({
      pgPool: pool,
      concurrency: this.env.WORKER_CONCURRENCY,
      pollInterval: POLL_MS,
      noHandleSignals: true,
      events,
      logger: new Logger(() => (level, message) => this.log(level, message)),
      parsedCronItems: parseCronItems([
        {
          task: 'check-evidence',
          match: this.env.EVIDENCE_CRON,
          options: { backfillPeriod: 0, maxAttempts: 1 },
        },
        { task: 'sweep-storage', match: this.env.SWEEP_CRON, options: { backfillPeriod: 0, maxAttempts: 1 } },
      ]),
      taskList: {
        [ANALYSE_TASK]: (payload) =>
          this.counted(async () => {
            const { jobId } = payloadSchema.parse(payload);
            await this.analysis.run(jobId, this.#workerId, this.#ending.signal);
          }),
        'check-evidence': () =>
          this.counted(async () => {
            const counts = await this.sweep.checkAll(this.#ending.signal);
            this.#logger.log({ ...counts, msg: 'checked every stored object against its hash' });
          }),
        'sweep-storage': () =>
          this.counted(async () => {
            await this.sweep.forgetOldRows();
            const report = await this.sweep.sweep({ removesOrphans: this.env.SWEEP_REMOVES_ORPHANS });
            this.#logger.log({ ...report, orphans: report.orphans.length, msg: 'swept the storage' });
          }),
      },
    });
  }

  /**
   * Begins anew where ready jobs lie while nothing is being done: a queue whose question for jobs went down with its
   * connection may wait for the answer for ever.
   */
  private async lookAtQueue(): Promise<void> {
    try {
      const { rows } = (await this.#pool?.query<{ isLying: boolean }>(READY_JOBS, [LYING_AFTER_S])) ?? {
        rows: [],
      };
      if (rows[0]?.isLying !== true || this.#active > 0 || this.#ending.signal.aborted) return;
      this.#logger.warn('the queue stood still: it begins anew');
      const [runner, pool] = [this.#runner, this.#pool];
      await this.begin();
      await runner?.stop();
      await pool?.end();
    } catch (error) {
      // The database may be away for a moment; the next look comes anyway.
      this.#logger.warn(
        `looking at the queue failed: ${error instanceof Error ? error.message : String(error)}`,
      );
    }
  }

  /** Resolves when the queue ended by itself, which it does not do as long as all is well. */
  async ended(): Promise<void> {
    for (let runner = this.#runner; ; runner = this.#runner) {
      await runner?.promise;
      if (runner === this.#runner) return;
    }
  }

  /** Ends running analyses, hands their jobs back, then ends the queue. */
  async stop(): Promise<void> {
    this.#ending.abort();
    clearInterval(this.#watch);
    await this.#runner?.stop();
    await this.heartbeat.stop();
    await this.#pool?.end();
  }

  private async counted(work: () => Promise<void>): Promise<void> {
    this.#active += 1;
    try {
      await work();
    } finally {
      this.#active -= 1;
    }
  }

  private log(level: string, message: string): void {
    if (level === 'error') this.#logger.error(message);
    else if (level === 'warning') this.#logger.warn(message);
    else this.#logger.debug(message);
  }
}
