import type { EntityManager } from 'typeorm';

export const ANALYSE_TASK = 'analyse';

/** Smaller runs first. */
export const PRIORITY = { onDemand: -5, upload: 0, maintenance: 10 } as const;

/** The queue's own tries only carry a job over a lost connection; how often an analysis is tried stands on its row. */
const QUEUE_TRIES = 25;

/** Puts an analysis on the queue within the caller's transaction: it is there if and only if that commits. */
export async function enqueueAnalysis(
  tx: Pick<EntityManager, 'query'>,
  jobId: string,
  priority: number,
): Promise<void> {
  await tx.query(
    `SELECT graphile_worker.add_job($1, json_build_object('jobId', $2::text), job_key => 'analysis:' || $2::text,
       priority => $3, max_attempts => $4)`,
    [ANALYSE_TASK, jobId, priority, QUEUE_TRIES],
  );
}

export async function dequeueAnalysis(tx: Pick<EntityManager, 'query'>, jobId: string): Promise<void> {
  await tx.query(`SELECT graphile_worker.remove_job('analysis:' || $1::text)`, [jobId]);
}

/** What pages are told about a capture while it is worked on. */
export interface CaptureEvent {
  readonly captureId: string;
  readonly state: string;
  readonly progress: number | null;
  readonly recordId?: string | null;
  readonly failure?: { readonly code: string; readonly message: string; readonly attempts: number } | null;
}

export const CAPTURE_CHANNEL = 'benchlark_capture';

/** Tells every listening server; within a transaction, at its commit. */
export async function announce(tx: Pick<EntityManager, 'query'>, event: CaptureEvent): Promise<void> {
  await tx.query('SELECT pg_notify($1, $2)', [CAPTURE_CHANNEL, JSON.stringify(event)]);
}
