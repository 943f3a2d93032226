import { createHash } from 'node:crypto';
import { once } from 'node:events';
import { connect, type AddressInfo } from 'node:net';
import { readFile, rename, stat } from 'node:fs/promises';
import { join } from 'node:path';
import request from 'supertest';
import type { CaptureDto } from '../src/captures/dto/capture.dto';
import { MARKER_NAME } from '../src/storage/folder-store';
import { createBench, type Bench } from './support/bench';
import { wavBytes } from './support/wav-bytes';

const LIMIT_BYTES = 400_000;

describe('uploads', () => {
  let bench: Bench;
  beforeAll(async () => {
    bench = await createBench({ env: { MAX_UPLOAD_BYTES: String(LIMIT_BYTES), UPLOAD_STALL_MS: '1000' } });
  });
  afterAll(() => bench.close());
  afterEach(async () => {
    // Sockets are closed a moment after their answer.
    for (let tries = 0; tries < 20 && (await bench.tempFiles()).length > 0; tries++) {
      await new Promise((resolve) => setTimeout(resolve, 50));
    }
    expect(await bench.tempFiles()).toEqual([]);
  });
  const captureCount = async () =>
    (await bench.dataSource.query<{ count: number }[]>('SELECT count(*)::int AS count FROM capture'))[0]!
      .count;

  it('keeps the very bytes under their hash, with what the file is', async () => {
    const bytes = wavBytes({ seed: 11 });
    const sha256 = createHash('sha256').update(bytes).digest('hex');
    const capture = await bench.uploaded(bytes, { name: 'höhe 1.wav' });
    expect(capture).toMatchObject({
      fileName: 'höhe 1.wav',
      sizeBytes: bytes.length,
      sha256,
      sampleRateHz: 48_000,
      channelCount: 2,
      bitsPerSample: 16,
      sampleFormat: 'integer',
      frameCount: 24_000,
      durationS: 0.5,
      state: 'queued',
      evidence: 'sound',
      unit: null,
      sameBytesAs: [],
      record: null,
    });
    const path = join(bench.storeDir, sha256.slice(0, 2), sha256.slice(2, 4), sha256);
    expect(await readFile(path)).toEqual(bytes);
    const trail = await bench.dataSource.query(
      `SELECT actor_name AS who, detail FROM audit_entry WHERE action = 'capture.stored' AND subject = $1`,
      [`capture:${capture.id}`],
    );
    expect(trail).toEqual([{ who: 'Test technician', detail: `höhe 1.wav, SHA-256 ${sha256}` }]);
    expect((await stat(path)).mode & 0o077).toBe(0);
  });

  it.each([
    [
      'a file of another kind',
      Buffer.from('%PDF-1.7 this is no recording at all, whatever its name says'),
      415,
      'NOT_A_WAV',
    ],
    ['an empty file', Buffer.alloc(0), 415, 'NOT_A_WAV'],
    ['a compressed file', withFormatTag(wavBytes({ durationS: 0.01 }), 0x55), 415, 'NOT_A_WAV'],
    ['a header that ends early', wavBytes().subarray(0, 30), 422, 'WAV_UNREADABLE'],
    ['a file without samples', wavBytes({ durationS: 0 }), 422, 'WAV_UNREADABLE'],
  ])('refuses %s and says why', async (_, bytes, status, code) => {
    const before = await captureCount();
    const answer = await bench.upload(bytes).expect(status);
    expect(answer.headers['content-type']).toContain('application/problem+json');
    expect(answer.body).toMatchObject({
      status,
      code,
      requestId: expect.any(String),
      remedy: expect.any(String),
    });
    expect(answer.body.offset).toEqual(expect.any(Number));
    expect(answer.body.reason).toMatch(/^WAV_/);
    expect(JSON.stringify(answer.body)).not.toContain(bench.storeDir);
    expect(await captureCount()).toBe(before);
  });

  it('files a capture by its form fields and refuses wrong ones without keeping the file', async () => {
    const unit = (await bench.post('/api/units').send({ maker: 'Kestrel', model: 'One' }).expect(201)).body;
    const condition = (
      await bench.post(`/api/units/${unit.id}/conditions`).send({ name: 'as received' }).expect(201)
    ).body;
    const bytes = wavBytes({ seed: 12 });
    const filed = await bench.uploaded(bytes, {
      fields: { conditionId: condition.id, note: 'left bank', unitId: '' },
    });
    expect(filed).toMatchObject({
      unit: { id: unit.id },
      condition: { name: 'as received' },
      note: 'left bank',
    });
    const before = await captureCount();
    const missing = { unitId: '00000000-0000-4000-8000-000000000000' };
    const answer = await bench.upload(wavBytes({ seed: 13 }), { fields: missing }).expect(400);
    expect(answer.body.fields).toEqual({ unitId: ['is not a known unit'] });
    await bench.upload(bytes, { fields: { surplus: 'x' } }).expect(400);
    await bench.upload(bytes, { fields: { unitId: 'no id' } }).expect(400);
    await bench.upload(bytes, { fields: { 'a[b]': 'x' } }).expect(400);
    expect(await captureCount()).toBe(before);
  });

  it('refuses a form without a file, and one that is no form', async () => {
    await bench.post('/api/captures').field('note', 'nothing').expect(400);
    await bench.post('/api/captures').send({ note: 'json' }).expect(400);
    await bench.post('/api/captures').set('Content-Type', 'multipart/form-data').send('x').expect(400);
  });

  it('lets nobody without a role for it upload', async () => {
    for (const role of ['administrator', 'reader', 'peer'] as const) {
      await request(bench.server)
        .post('/api/captures')
        .set(bench.as(role))
        .attach('file', wavBytes(), 'a.wav')
        .expect(403);
    }
    await request(bench.server).post('/api/captures').attach('file', wavBytes(), 'a.wav').expect(401);
  });

  it('refuses a stated length over the limit before the body is sent', async () => {
    const socket = openSocket(bench);
    socket.write(head(bench, `Content-Length: ${LIMIT_BYTES * 100}`));
    const startedMs = Date.now();
    const answer = await readAnswer(socket);
    expect(answer).toMatch(/^HTTP\/1\.1 413 /);
    expect(answer).toContain('FILE_TOO_LARGE');
    expect(Date.now() - startedMs).toBeLessThan(1_000);
    socket.destroy();
  });

  it('cuts off a body of unstated length at the limit, without waiting for its end', async () => {
    const socket = openSocket(bench);
    socket.write(head(bench, 'Transfer-Encoding: chunked'));
    writeChunk(socket, PART_HEAD);
    for (let sent = 0; sent < LIMIT_BYTES + 100_000; sent += 50_000) writeChunk(socket, Buffer.alloc(50_000));
    const answer = await readAnswer(socket);
    expect(answer).toMatch(/^HTTP\/1\.1 413 /);
    socket.destroy();
  });

  it('keeps nothing of an upload that is cut off', async () => {
    const before = await captureCount();
    const bytes = wavBytes({ seed: 14 });
    const socket = openSocket(bench);
    socket.write(head(bench, `Content-Length: ${bytes.length + 500}`));
    socket.write(PART_HEAD);
    socket.write(bytes.subarray(0, bytes.length / 2));
    await waitFor(async () => (await bench.tempFiles()).length === 1);
    socket.destroy();
    await waitFor(async () => (await bench.tempFiles()).length === 0);
    expect(await captureCount()).toBe(before);
  });

  it('ends an upload from which nothing comes any more', async () => {
    const socket = openSocket(bench);
    socket.write(head(bench, 'Content-Length: 200000'));
    socket.write(PART_HEAD);
    expect(await readAnswer(socket)).toMatch(/^HTTP\/1\.1 408 /);
    socket.destroy();
  });

  it('takes a slow honest upload that lasts longer than the stall limit', async () => {
    const bytes = wavBytes({ seed: 15, durationS: 0.1 });
    const tail = Buffer.from('\r\n--line--\r\n');
    const socket = openSocket(bench);
    socket.write(head(bench, `Content-Length: ${PART_HEAD.length + bytes.length + tail.length}`));
    socket.write(PART_HEAD);
    const step = Math.ceil(bytes.length / 8);
    for (let at = 0; at < bytes.length; at += step) {
      socket.write(bytes.subarray(at, at + step));
      await new Promise((resolve) => setTimeout(resolve, 250));
    }
    socket.write(tail);
    expect(await readAnswer(socket)).toMatch(/^HTTP\/1\.1 201 /);
    socket.destroy();
  });

  it('stores equal bytes once, however many send them at the same moment', async () => {
    const bytes = wavBytes({ seed: 16 });
    const answers = await Promise.all(
      Array.from({ length: 10 }, (_, n) => bench.upload(bytes, { name: `${n}.wav` })),
    );
    expect(answers.map(({ status }) => status)).toEqual(Array(10).fill(201));
    const ids = new Set(answers.map(({ body }) => (body as CaptureDto).id));
    expect(ids.size).toBe(10);
    const { sha256 } = answers[0]!.body as CaptureDto;
    const objects = await bench.dataSource.query('SELECT * FROM stored_object WHERE sha256 = $1', [sha256]);
    expect(objects).toHaveLength(1);
    const last = (await bench.get(`/api/captures/${[...ids][0]}`).expect(200)).body as CaptureDto;
    expect(new Set(last.sameBytesAs.map(({ id }) => id))).toEqual(new Set([...ids].slice(1)));
  });

  it('answers an Idempotency-Key once, also in parallel, and refuses it for another upload', async () => {
    const bytes = wavBytes({ seed: 17 });
    const answers = await Promise.all([1, 2, 3, 4].map(() => bench.upload(bytes, { key: 'take-17' })));
    expect(answers.map(({ status }) => status)).toEqual([201, 201, 201, 201]);
    expect(new Set(answers.map(({ body }) => (body as CaptureDto).id)).size).toBe(1);
    const again = await bench.upload(bytes, { key: 'take-17' }).expect(201);
    expect(again.body.id).toBe(answers[0]!.body.id);
    const other = await bench.upload(wavBytes({ seed: 18 }), { key: 'take-17' }).expect(409);
    expect(other.body.reason).toBe('IDEMPOTENCY_KEY_REUSED');
  });

  it('leaves neither row nor job when the transaction fails', async () => {
    await bench.dataSource.query(
      'ALTER TABLE analysis_job ADD CONSTRAINT ck_for_the_test CHECK (false) NOT VALID',
    );
    const counts = () =>
      bench.dataSource
        .query(`SELECT (SELECT count(*) FROM capture) AS captures, (SELECT count(*) FROM stored_object) AS objects,
        (SELECT count(*) FROM graphile_worker._private_jobs) AS jobs`);
    const before = await counts();
    await bench.upload(wavBytes({ seed: 19 })).expect(500);
    expect(await counts()).toEqual(before);
    await bench.dataSource.query('ALTER TABLE analysis_job DROP CONSTRAINT ck_for_the_test');
    await bench.uploaded(wavBytes({ seed: 19 }));
  });

  it.each([
    ['../../etc/passwd.wav', 'passwd.wav'],
    ['C:\\takes\\left.wav', 'left.wav'],
    ['take\u202e 7.wav', 'take 7.wav'],
    ['<img src=x onerror=alert(1)>.wav', '<img src=x onerror=alert(1)>.wav'],
  ])('only ever shows the name %s', async (name, shown) => {
    const capture = await bench.uploaded(wavBytes({ seed: 20, durationS: 0.01 }), { name });
    expect(capture.fileName).toBe(shown);
  });
});

describe('uploads to a store in trouble', () => {
  it('are refused while the disk is nearly full, with the reason, and taken again afterwards', async () => {
    const bench = await createBench({ env: { STORAGE_MIN_FREE_BYTES: String(2 ** 50) } });
    try {
      const answer = await bench.upload(wavBytes()).expect(507);
      expect(answer.body).toMatchObject({
        code: 'STORAGE_FULL',
        detail: expect.any(String),
        remedy: expect.any(String),
      });
      expect(await bench.tempFiles()).toEqual([]);
    } finally {
      await bench.close();
    }
  });

  it('are refused while the folder is not the store, which readiness shows', async () => {
    const bench = await createBench();
    try {
      await request(bench.server).get('/api/health/ready').expect(200);
      const marker = join(bench.storeDir, MARKER_NAME);
      await rename(marker, `${marker}.away`);
      await bench.upload(wavBytes()).expect(503).expect('Retry-After', '30');
      const ready = await request(bench.server).get('/api/health/ready').expect(503);
      expect(ready.body.components).toMatchObject({ storage: 'down', database: 'up' });
      await request(bench.server).get('/api/health/live').expect(200);
      await rename(`${marker}.away`, marker);
      await bench.uploaded(wavBytes());
    } finally {
      await bench.close();
    }
  });
});

const PART_HEAD = Buffer.from(
  '--line\r\nContent-Disposition: form-data; name="file"; filename="a.wav"\r\nContent-Type: audio/wav\r\n\r\n',
);

function withFormatTag(bytes: Buffer, tag: number): Buffer {
  bytes.writeUInt16LE(tag, 20);
  return bytes;
}

function openSocket(bench: Bench) {
  const socket = connect((bench.server.address() as AddressInfo).port, '127.0.0.1');
  socket.on('error', () => socket.destroy()); // the server may close while we still write
  return socket;
}

function head(bench: Bench, bodyHeader: string): string {
  const { Authorization } = bench.as('technician');
  const lines = [
    'Host: 127.0.0.1',
    `Authorization: ${Authorization}`,
    'Content-Type: multipart/form-data; boundary=line',
    bodyHeader,
  ];
  return `POST /api/captures HTTP/1.1\r\n${lines.join('\r\n')}\r\n\r\n`;
}

function writeChunk(socket: ReturnType<typeof openSocket>, bytes: Buffer): void {
  if (socket.destroyed) return;
  socket.write(`${bytes.length.toString(16)}\r\n`);
  socket.write(bytes);
  socket.write('\r\n');
}

async function readAnswer(socket: ReturnType<typeof openSocket>): Promise<string> {
  let text = '';
  while (!text.includes('}')) {
    const [bytes] = (await once(socket, 'data')) as [Buffer];
    text += bytes.toString('utf8');
  }
  return text;
}

async function waitFor(holds: () => Promise<boolean>): Promise<void> {
  for (let tries = 0; tries < 100; tries++) {
    if (await holds()) return;
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  throw new Error('it never became so');
}
