import { Inject, Injectable, Logger } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { ENV } from '../config/env.module';
import type { Env } from '../config/env.schema';
import { enqueueAnalysis } from './job-queue';

/** Any fixed number will do: one worker at a time looks after the others. */
const REAPER_LOCK = 1_764_580_060;
/** A waiting job without a place in the queue is given one after this; until then its transaction may be under way. */
const LOST_AFTER_S = 15;
/** The queue doubles its wait at each lost connection; once the database is back, nobody need wait longer than this. */
const LONGEST_WAIT_S = 5;

/** A lock on a job that has not begun after this belongs to nobody. */
const UNANSWERED_AFTER_S = 8;

/**
 * Keeps this worker's row alive and takes back what dead workers held.
 *
 * All times are the database's, so that a wrong clock on one machine harms nobody.
 */
@Injectable()
export class Heartbeat {
  readonly #logger = new Logger('Heartbeat');
  #timer: NodeJS.Timeout | undefined;
  #workerId: () => string = () => '';
  #running: Promise<void> = Promise.resolve();

  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Env,
  ) {}

  /** @param workerId - gives the queue's id of this process, which stands on the jobs it holds */
  async start(workerId: () => string): Promise<void> {
    this.#workerId = workerId;
    await this.beat(workerId());
    this.#timer = setInterval(() => {
      this.#running = this.#running.then(() => this.tick(workerId()));
    }, this.env.WORKER_HEARTBEAT_MS);
  }

  async stop(): Promise<void> {
    clearInterval(this.#timer);
    await this.#running;
    await this.dataSource.query('DELETE FROM worker WHERE id = $1', [this.#workerId()]);
  }

  private async tick(workerId: string): Promise<void> {
    try {
      await this.beat(workerId);
      await this.reap();
    } catch (error) {
      // The database may be away for a moment; the next beat comes anyway.
      this.#logger.warn(`heartbeat failed: ${error instanceof Error ? error.message : String(error)}`);
    }
  }

  private async beat(workerId: string): Promise<void> {
    await this.dataSource.query(
      'INSERT INTO worker (id) VALUES ($1) ON CONFLICT (id) DO UPDATE SET seen_at = now()',
      [workerId],
    );
  }

  /** Frees the jobs of silent workers, and finds jobs that the queue lost. */
  private async reap(): Promise<void> {
    await this.dataSource.transaction(async (tx) => {
      const [lock] = await tx.query<{ isOurs: boolean }[]>(
        'SELECT pg_try_advisory_xact_lock($1) AS "isOurs"',
        [REAPER_LOCK],
      );
      if (!lock?.isOurs) return;
      const [dead] = await tx.query<[{ id: string }[], number]>(
        `DELETE FROM worker WHERE seen_at < now() - $1 * interval '1 millisecond' RETURNING id`,
        [this.env.WORKER_SILENT_MS],
      );
      const ids = dead.map(({ id }) => id);
      if (ids.length > 0) {
        this.#logger.warn(`took back the jobs of ${ids.length} silent worker(s): ${ids.join(', ')}`);
        await tx.query('SELECT graphile_worker.force_unlock_workers($1)', [ids]);
        await tx.query(
          `UPDATE graphile_worker._private_jobs SET run_at = now() WHERE locked_at IS NULL AND run_at > now()
             AND key IN (SELECT 'analysis:' || id FROM analysis_job WHERE worker_id = ANY ($1) AND state = 'running')`,
          [ids],
        );
      }
      await tx.query(
        `UPDATE graphile_worker._private_jobs SET run_at = now()
         WHERE key LIKE 'analysis:%' AND locked_at IS NULL AND run_at > now() + $1 * interval '1 second'`,
        [LONGEST_WAIT_S],
      );
      // A worker marks its job as running at once: a lock on one that still waits is a lock whose answer was lost on the way.
      await tx.query(
        `UPDATE graphile_worker._private_jobs AS q SET locked_at = NULL, locked_by = NULL, run_at = now()
         WHERE q.locked_at < now() - $1 * interval '1 second'
           AND EXISTS (SELECT 1 FROM analysis_job AS j WHERE q.key = 'analysis:' || j.id AND j.state = 'queued')`,
        [UNANSWERED_AFTER_S],
      );
      const lost = await tx.query<{ id: string; priority: number }[]>(
        `SELECT j.id, j.priority FROM analysis_job AS j
         WHERE j.state IN ('queued', 'running') AND j.created_at < now() - $1 * interval '1 second'
           AND NOT EXISTS (SELECT 1 FROM worker AS w WHERE w.id = j.worker_id)
           AND NOT EXISTS (SELECT 1 FROM graphile_worker._private_jobs AS q WHERE q.key = 'analysis:' || j.id)`,
        [LOST_AFTER_S],
      );
      for (const { id, priority } of lost) await enqueueAnalysis(tx, id, priority);
    });
  }
}
