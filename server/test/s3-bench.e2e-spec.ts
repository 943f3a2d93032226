import { createHash } from 'node:crypto';
import { mkdtemp, readdir, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { CaptureDto } from '../src/captures/dto/capture.dto';
import { SweepService } from '../src/storage/sweep.service';
import { createBench, type Bench } from './support/bench';
import { startFakeS3 } from './support/fake-s3';
import { waitFor } from './support/wait-for';
import { wavBytes } from './support/wav-bytes';
import { startWorker, type WorkerProcess } from './support/worker-process';

describe('a bench whose bytes lie in an S3-compatible store', () => {
  let directory: string;
  let fake: { url: string; stop: () => Promise<void> };
  let bench: Bench;
  let worker: WorkerProcess;

  beforeAll(async () => {
    directory = await mkdtemp(join(tmpdir(), 'benchlark-s3-'));
    fake = await startFakeS3(directory);
    const env = {
      STORAGE_KIND: 's3',
      S3_ENDPOINT: fake.url,
      S3_BUCKET: 'bench',
      S3_ACCESS_KEY_ID: 'S3RVER',
      S3_SECRET_ACCESS_KEY: 'S3RVER',
    };
    bench = await createBench({ env });
    worker = await startWorker(bench, env);
  });
  afterAll(async () => {
    await worker.end();
    await bench.close();
    await fake.stop();
    await rm(directory, { recursive: true, force: true });
  });

  it('takes a recording in, analyses it, hands it out, and notices a changed byte', async () => {
    const bytes = wavBytes({ seed: 55 });
    const { id, sha256 } = await bench.uploaded(bytes);
    const capture = await waitFor(
      () => bench.get(`/api/captures/${id}`).then(({ body }) => body as CaptureDto),
      ({ state }) => state !== 'queued' && state !== 'analysing',
    );
    expect(capture).toMatchObject({ state: 'done', record: { measure: 'tone' } });
    const range = await bench
      .get(`/api/captures/${id}/file`)
      .set('Range', 'bytes=0-3')
      .buffer(true)
      .expect(206);
    expect(range.headers['content-range']).toBe(`bytes 0-3/${bytes.length}`);
    const { body } = await bench.post(`/api/records/${capture.record!.id}/verify`).expect(200);
    expect(body).toMatchObject({ isEqual: true, evidence: 'sound' });
    await waitFor(
      () => bench.tempFiles(),
      (names) => names.length === 0,
    );

    const stored = (await readdir(join(directory, 'bench'))).find(
      (name) => name.startsWith(sha256) && name.endsWith('_object'),
    );
    const path = join(directory, 'bench', stored!);
    const changed = await readFile(path);
    expect(createHash('sha256').update(changed).digest('hex')).toBe(sha256);
    changed[500]! ^= 1;
    await writeFile(path, changed);
    expect(await bench.app.get(SweepService).checkAll()).toMatchObject({ damaged: 1, missing: 0 });
    expect((await bench.get(`/api/captures/${id}/file`).expect(409)).body.code).toBe('EVIDENCE_DAMAGED');
  });
});
