import { readFile, rm, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type request from 'supertest';
import { SweepService } from '../src/storage/sweep.service';
import { createBench, type Bench } from './support/bench';
import { wavBytes } from './support/wav-bytes';

describe('evidence', () => {
  let bench: Bench;
  beforeAll(async () => {
    bench = await createBench();
  });
  afterAll(() => bench.close());
  const pathOf = (sha256: string) => join(bench.storeDir, sha256.slice(0, 2), sha256.slice(2, 4), sha256);
  const flipOneBit = async (sha256: string) => {
    const bytes = await readFile(pathOf(sha256));
    bytes[bytes.length - 100]! ^= 1;
    await writeFile(pathOf(sha256), bytes);
  };

  it('hands out the very bytes, as a file that can be nothing else', async () => {
    const bytes = wavBytes({ seed: 41 });
    const { id } = await bench.uploaded(bytes, { name: `Höhe "1" ; a.wav` });
    const answer = await bench.get(`/api/captures/${id}/file`).buffer(true).parse(binary).expect(200);
    expect(answer.body).toEqual(bytes);
    expect(answer.headers).toMatchObject({
      'content-type': 'audio/wav',
      'content-disposition': `attachment; filename="H_he _1_ ; a.wav"; filename*=UTF-8''H%C3%B6he%20%221%22%20%3B%20a.wav`,
      'x-content-type-options': 'nosniff',
      'content-security-policy': "sandbox; default-src 'none'",
      'accept-ranges': 'bytes',
    });
  });

  it.each([
    ['bytes=0-9', 0, 10],
    ['bytes=100-', 100, undefined],
    ['bytes=-7', -7, undefined],
    ['bytes=10-99999999', 10, undefined],
  ])('hands out the range %s', async (range, from, to) => {
    const bytes = wavBytes({ seed: 42, durationS: 0.02 });
    const { id } = await bench.uploaded(bytes);
    const answer = await bench
      .get(`/api/captures/${id}/file`)
      .set('Range', range)
      .buffer(true)
      .parse(binary)
      .expect(206);
    expect(answer.body).toEqual(bytes.subarray(from, to));
  });

  it('refuses a range beyond the end, and sends the whole for one it does not know', async () => {
    const bytes = wavBytes({ seed: 43, durationS: 0.02 });
    const { id } = await bench.uploaded(bytes);
    await bench.get(`/api/captures/${id}/file`).set('Range', `bytes=${bytes.length}-`).expect(416);
    await bench.get(`/api/captures/${id}/file`).set('Range', 'bytes=0-1,5-6').expect(200);
  });

  it('never hands out a file of which one bit has changed, and says so everywhere', async () => {
    const bytes = wavBytes({ seed: 44 });
    const { id, sha256 } = await bench.uploaded(bytes);
    await bench.get(`/api/captures/${id}/file`).expect(200);
    await flipOneBit(sha256);
    const answer = await bench.get(`/api/captures/${id}/file`).expect(409);
    expect(answer.body).toMatchObject({ code: 'EVIDENCE_DAMAGED', remedy: expect.any(String) });
    await bench.get(`/api/captures/${id}/file`).set('Range', 'bytes=0-9').expect(409);
    expect((await bench.get(`/api/captures/${id}`)).body.evidence).toBe('damaged');
    expect((await bench.get('/api/today')).body.damaged.count).toBe(1);
    await bench.uploaded(bytes);
    expect((await bench.get(`/api/captures/${id}`)).body.evidence).toBe('sound');
    await bench.get(`/api/captures/${id}/file`).expect(200);
  });

  it('finds damaged and missing files when the store is re-hashed, and equal bytes heal them', async () => {
    const [damaged, missing, sound] = await Promise.all(
      [45, 46, 47].map((seed) => bench.uploaded(wavBytes({ seed }))),
    );
    await flipOneBit(damaged!.sha256);
    await rm(pathOf(missing!.sha256));
    const counts = await bench.app.get(SweepService).checkAll();
    expect(counts).toMatchObject({ damaged: 1, missing: 1 });
    const evidenceOf = async (id: string) => (await bench.get(`/api/captures/${id}`)).body.evidence as string;
    expect(await evidenceOf(damaged!.id)).toBe('damaged');
    expect(await evidenceOf(missing!.id)).toBe('missing');
    expect(await evidenceOf(sound!.id)).toBe('sound');
    expect((await bench.get(`/api/captures/${missing!.id}/file`).expect(410)).body.code).toBe(
      'EVIDENCE_MISSING',
    );
    for (const seed of [45, 46]) await bench.uploaded(wavBytes({ seed }));
    expect(await bench.app.get(SweepService).checkAll()).toMatchObject({ damaged: 0, missing: 0 });
  });

  it('tells of other captures only to those who may see them', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 48 }));
    const { Authorization } = bench.as('reader');
    await bench.get(`/api/captures/${id}/file`).set({ Authorization }).expect(403);
    await bench.get('/api/captures/00000000-0000-4000-8000-000000000000/file').expect(404);
    await bench.get('/api/captures/..%2f..%2fetc%2fpasswd/file').expect(404);
  });
});

function binary(answer: request.Response, done: (error: Error | null, bytes: Buffer) => void): void {
  const stream = answer as unknown as NodeJS.ReadableStream; // what superagent hands a parser is the stream itself
  const chunks: Buffer[] = [];
  stream.on('data', (chunk: Buffer) => chunks.push(chunk));
  stream.on('end', () => done(null, Buffer.concat(chunks)));
}
