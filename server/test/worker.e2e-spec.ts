import { randomUUID } from 'node:crypto';
import type { CaptureDto } from '../src/captures/dto/capture.dto';
import { CaptureEvents } from '../src/events/capture-events.service';
import type { JobDto } from '../src/jobs/dto/job.dto';
import { createBench, type Bench } from './support/bench';
import { waitFor } from './support/wait-for';
import { wavBytes } from './support/wav-bytes';
import { startWorker, type WorkerProcess } from './support/worker-process';

/** Long enough that a worker can be caught in the middle of it. */
const longTake = wavBytes({ durationS: 100 });
const long = (seed: number) => {
  longTake.writeInt16LE(seed, longTake.length - 2);
  return Buffer.from(longTake);
};

describe('worker', () => {
  let bench: Bench;
  const workers: WorkerProcess[] = [];
  const start = async (env?: Record<string, string>) => {
    const worker = await startWorker(bench, env);
    workers.push(worker);
    return worker;
  };
  beforeAll(async () => {
    bench = await createBench({ env: { JOB_MAX_ATTEMPTS: '2' } });
  });
  afterEach(async () => {
    for (const { child } of workers.splice(0)) {
      child.kill('SIGCONT');
      child.kill('SIGKILL');
    }
    await bench.dataSource.query('DELETE FROM worker');
  });
  afterAll(() => bench.close());

  const captureOf = (id: string) => bench.get(`/api/captures/${id}`).then(({ body }) => body as CaptureDto);
  const jobOf = async (captureId: string) => {
    const { body } = await bench.get('/api/jobs').expect(200);
    return (body.items as JobDto[]).find((job) => job.captureId === captureId)!;
  };
  const running = (id: string, attempts = 1) =>
    waitFor(
      () => jobOf(id),
      (job) => job.state === 'running' && job.attempts === attempts,
    );
  const done = (id: string, timeoutMs?: number) =>
    waitFor(
      () => captureOf(id),
      ({ state }) => state === 'done',
      timeoutMs,
    );
  const recordCount = async (id: string) =>
    (await bench.get(`/api/captures/${id}/records`)).body.items.length as number;

  it('takes up the job of a killed worker within 30 s, with the settings it has by default', async () => {
    const defaults = { WORKER_HEARTBEAT_MS: '3000', WORKER_SILENT_MS: '12000' };
    const first = await start(defaults);
    const { id } = await bench.uploaded(long(71));
    await running(id);
    await first.end('SIGKILL');
    const killedMs = Date.now();
    await start(defaults);
    await running(id, 2);
    expect(Date.now() - killedMs).toBeLessThan(30_000);
    await done(id);
    expect(await recordCount(id)).toBe(1);
  });

  it('refuses the late result of a worker that was frozen and taken for dead', async () => {
    const frozen = await start();
    const { id } = await bench.uploaded(long(72));
    await running(id);
    frozen.child.kill('SIGSTOP');
    await start();
    await running(id, 2);
    await done(id);
    frozen.child.kill('SIGCONT');
    await waitFor(
      () => bench.dataSource.query<unknown[]>('SELECT id FROM worker'),
      (rows) => rows.length === 2,
    );
    await new Promise((resolve) => setTimeout(resolve, 2_000));
    expect(await recordCount(id)).toBe(1);
    expect(await jobOf(id)).toMatchObject({ state: 'done', attempts: 2 });
  });

  it('gives up a job in which the worker dies each time, and goes on with the others', async () => {
    const { id } = await bench.uploaded(long(73));
    for (const attempt of [1, 2]) {
      const worker = await start();
      await running(id, attempt);
      await worker.end('SIGKILL');
    }
    await start();
    const other = await bench.uploaded(wavBytes({ seed: 74 }));
    await done(other.id);
    const lost = await waitFor(
      () => captureOf(id),
      ({ state }) => state === 'failed',
    );
    expect(lost.failure).toMatchObject({ code: 'WORKER_LOST', attempts: 2 });
  });

  it('fails a job whose analysis breaks down each time, says why, and goes on with the others', async () => {
    const poisoned = await bench.uploaded(wavBytes({ seed: 75 }));
    // Settings that the API would never let in make the thread throw what nobody foresaw.
    await bench.dataSource.query(`UPDATE analysis_job SET settings = 'null' WHERE capture_id = $1`, [
      poisoned.id,
    ]);
    const other = await bench.uploaded(wavBytes({ seed: 76 }));
    await start();
    await done(other.id);
    const failed = await waitFor(
      () => captureOf(poisoned.id),
      ({ state }) => state === 'failed',
    );
    expect(failed.failure).toMatchObject({ code: 'ANALYSIS_CRASHED', attempts: 2 });
    expect(failed.failure!.message).toContain('attempt 2 of 2');

    await bench.dataSource.query(`UPDATE analysis_job SET settings = '{}' WHERE capture_id = $1`, [
      poisoned.id,
    ]);
    await bench.post(`/api/jobs/${failed.jobId}/retry`).expect(202);
    expect((await done(poisoned.id)).failure).toBeNull();
    await bench.post(`/api/jobs/${failed.jobId}/retry`).expect(409);
  });

  it('outlives an analysis that needs more memory than it may have', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 77 }));
    const worker = await start({ ANALYSIS_MEMORY_MB: '3' });
    const failed = await waitFor(
      () => captureOf(id),
      ({ state }) => state === 'failed',
    );
    expect(failed.failure).toMatchObject({
      code: 'ANALYSIS_CRASHED',
      message: expect.stringContaining('more than 3 MB'),
    });
    expect(worker.child.exitCode).toBeNull();
  });

  it('ends a running analysis when it is cancelled, and one that waits', async () => {
    await start();
    const first = await bench.uploaded(long(78));
    const bytes = long(79);
    await running(first.id);
    const second = await bench.uploaded(bytes);
    for (const { id } of [second, first]) {
      await bench.delete(`/api/jobs/${(await jobOf(id)).id}`).expect(204);
      expect(await captureOf(id)).toMatchObject({ state: 'cancelled', record: null });
      await bench.delete(`/api/jobs/${(await jobOf(id)).id}`).expect(409);
    }
    const next = await bench.uploaded(wavBytes({ seed: 80 }));
    await done(next.id, 10_000);
    expect(await recordCount(first.id)).toBe(0);
    await bench.delete(`/api/jobs/${randomUUID()}`).expect(404);
  });

  it('hands its job back when it is told to end, and the try does not count', async () => {
    const worker = await start();
    const { id } = await bench.uploaded(long(81));
    await running(id);
    expect(await worker.end('SIGTERM')).toEqual({ code: 0, signal: null });
    expect(await jobOf(id)).toMatchObject({ state: 'queued', attempts: 1, maxAttempts: 3 });
    await start();
    await done(id);
    expect(await bench.dataSource.query<unknown[]>('SELECT id FROM worker')).toHaveLength(1);
  });

  it('finds a job that the queue has lost', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 82 }));
    await bench.dataSource.query('DELETE FROM graphile_worker._private_jobs');
    await bench.dataSource.query(
      `UPDATE analysis_job SET created_at = now() - interval '1 hour' WHERE capture_id = $1`,
      [id],
    );
    await start();
    await done(id);
  });

  it('takes up a job whose lock nobody heard of: the answer was lost with its connection', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 83 }));
    await bench.dataSource.query(
      `UPDATE graphile_worker._private_jobs SET locked_at = now() - interval '1 minute', locked_by = 'nobody'
       WHERE key IN (SELECT 'analysis:' || id FROM analysis_job WHERE capture_id = $1)`,
      [id],
    );
    await start();
    await done(id);
  });

  it('goes on, and its events with it, after the database has dropped every connection', async () => {
    const worker = await start();
    const seen: string[] = [];
    const subscription = bench.app.get(CaptureEvents).all.subscribe(({ captureId }) => seen.push(captureId));
    await bench.dataSource
      .query(
        `SELECT pg_terminate_backend(pid) FROM pg_stat_activity WHERE datname = current_database() AND pid <> pg_backend_pid()`,
      )
      .catch(() => undefined); // its own pool loses connections as well
    const { id } = await waitFor(
      () => bench.upload(wavBytes({ seed: 84 })).then(({ body }) => body as CaptureDto),
      (capture) => capture.id !== undefined,
    );
    await done(id);
    expect(worker.child.exitCode).toBeNull();
    const again = await bench.uploaded(wavBytes({ seed: 85 }));
    await done(again.id);
    await waitFor(
      () => Promise.resolve(seen),
      (ids) => ids.includes(again.id),
    );
    subscription.unsubscribe();
  });

  it('shares one queue with another worker, each job once', async () => {
    await Promise.all([start(), start()]);
    const captures = await Promise.all(
      Array.from({ length: 8 }, (_, n) => bench.uploaded(wavBytes({ seed: 90 + n }))),
    );
    for (const { id } of captures) {
      await done(id);
      expect(await jobOf(id)).toMatchObject({ state: 'done', attempts: 1 });
      expect(await recordCount(id)).toBe(1);
    }
  });
});
