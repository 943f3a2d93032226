import { createHash } from 'node:crypto';
import { readFile, writeFile } from 'node:fs/promises';
import { join } from 'node:path';
import type { AddressInfo } from 'node:net';
import request from 'supertest';
import { analyseCapture, bytesFromMemory, openWav, toRecordJson, type BenchRecord } from '@benchlark/dsp';
import type { CaptureDto } from '../src/captures/dto/capture.dto';
import type { CaptureEvent } from '../src/jobs/job-queue';
import type { RecordDto, VerificationDto } from '../src/records/dto/record.dto';
import type { RecordSummaryDto } from '../src/records/dto/record-summary.dto';
import { createBench, type Bench } from './support/bench';
import { waitFor } from './support/wait-for';
import { wavBytes, wavWithNaN } from './support/wav-bytes';
import { startWorker, type WorkerProcess } from './support/worker-process';

describe('records', () => {
  let bench: Bench;
  let worker: WorkerProcess;
  const bytes = wavBytes({ durationS: 2, seed: 61 });
  let capture: CaptureDto;

  beforeAll(async () => {
    bench = await createBench();
    worker = await startWorker(bench);
    capture = await settled((await bench.uploaded(bytes, { name: 'tone.wav' })).id);
  });
  afterAll(async () => {
    const { code } = await worker.end();
    await bench.close();
    expect(code).toBe(0);
  });

  const settled = async (id: string) =>
    await waitFor(
      () => bench.get(`/api/captures/${id}`).then(({ body }) => body as CaptureDto),
      ({ state }) => state !== 'queued' && state !== 'analysing',
    );
  const recordOf = async (id: string) =>
    (await bench.get(`/api/records/${id}`).expect(200)).body as RecordDto;

  it('gives a capture the record that the same functions give here', async () => {
    expect(capture).toMatchObject({ state: 'done', failure: null, progress: null });
    expect(capture.record).toMatchObject({
      ordinal: 1,
      measure: 'tone',
      supersedesId: null,
      supersededById: null,
    });
    expect(capture.record!.recognisedAs).toMatch(/^tone: /);
    expect(capture.record!.fundamentalFrequencyHz).toBeCloseTo(997, 3);
    expect(capture.record!.mainFigure).toMatchObject({ key: 'thdPlusNoiseDb', unit: 'dB' });
    expect(capture.record!.sketch).toHaveLength(2);
    expect(capture.record!.sketch[0]).toHaveLength(64);

    const answer = await bench.get(`/api/records/${capture.record!.id}/download`).expect(200);
    expect(answer.headers['content-disposition']).toContain(`capture-${capture.number}-record-1.json`);
    const { record } = await analyseHere(bytes);
    expect(JSON.parse(answer.text)).toEqual(
      JSON.parse(JSON.stringify(toRecordJson(record, { traces: 'reduced' }))),
    );
  });

  it('hands out each trace in full, as the bytes its hash names', async () => {
    const { id, record } = await recordOf(capture.record!.id);
    const here = (await analyseHere(bytes)).record;
    const [left] = (record as unknown as BenchRecord).channels;
    expect(Object.keys(left!.traces)).toEqual(Object.keys(here.channels[0]!.traces));
    for (const [name, trace] of Object.entries(
      left!.traces as unknown as Record<string, { href: string; points: number }>,
    )) {
      const answer = await bench.get(trace.href).buffer(true).expect(200);
      const body = answer.body as Buffer;
      expect(answer.headers['content-type']).toBe('application/octet-stream');
      expect(createHash('sha256').update(body).digest('hex')).toBe(trace.href.split('/').at(-1));
      const values = new Float64Array(body.buffer.slice(body.byteOffset, body.byteOffset + body.length));
      expect(values.length).toBe(2 * trace.points);
      expect(values).toEqual(
        Float64Array.from([
          ...Array.from(here.channels[0]!.traces[name]!.x),
          ...Array.from(here.channels[0]!.traces[name]!.y),
        ]),
      );
    }
    const foreign = 'f'.repeat(64);
    await bench.get(`/api/records/${id}/traces/${foreign}`).expect(404);
    await bench.get(`/api/records/${id}/traces/nonsense`).expect(404);
    // A trace belongs to its record: the capture's own bytes can't be had by this way.
    await bench.get(`/api/records/${id}/traces/${capture.sha256}`).expect(404);
  });

  it('keeps every figure as a row and as a line of a table', async () => {
    const { record } = await recordOf(capture.record!.id);
    const rows = await bench.dataSource.query<{ channel: string; key: string; value: number | null }[]>(
      'SELECT channel, key, value FROM record_figure WHERE record_id = $1',
      [capture.record!.id],
    );
    const { channels } = record as unknown as BenchRecord;
    for (const { channel, figures } of channels) {
      const stored = Object.fromEntries(
        rows.filter((row) => row.channel === channel).map(({ key, value }) => [key, value]),
      );
      expect(stored).toEqual(figures);
    }
    const csv = await bench.get(`/api/records/${capture.record!.id}/download?format=csv`).expect(200);
    expect(csv.text.split('\r\n')).toHaveLength(rows.length + 2);
    expect(csv.text).toContain(
      `0,tone,left,fundamentalFrequencyHz,${channels[0]!.figures['fundamentalFrequencyHz']},Hz`,
    );
  });

  it('draws the outline of the wave', async () => {
    const { body } = await bench.get(`/api/captures/${capture.id}/overview`).expect(200);
    expect(body.channels).toHaveLength(2);
    expect(body.channels[0].max.length).toBe(Math.ceil(96_000 / body.framesPerBin));
    expect(body.channels[0].max.length).toBeLessThanOrEqual(2_000);
    expect(Math.max(...body.channels[0].max)).toBeCloseTo(0.5, 3);
    expect(Math.min(...body.channels[1].min)).toBeCloseTo(-0.5, 3);
  });

  it('adds a record that supersedes, once for the same settings, and keeps both', async () => {
    const settings = { bandHighHz: 5_000, fromS: 0.5, toS: 1.5 };
    const asked = await bench.post(`/api/captures/${capture.id}/records`).send(settings).expect(202);
    expect(asked.body.isNew).toBe(true);
    const again = await bench.post(`/api/captures/${capture.id}/records`).send(settings).expect(202);
    expect(again.body).toEqual({ jobId: asked.body.jobId, isNew: false, notes: [] });
    const { record } = await settled(capture.id);
    expect(record).toMatchObject({ ordinal: 2, supersedesId: capture.record!.id });
    const newer = await recordOf(record!.id);
    expect(newer.record['settings']).toMatchObject({ bandHighHz: 5_000, fromS: 0.5, toS: 1.5 });
    expect(newer.isCurrent).toBe(true);
    const older = await recordOf(capture.record!.id);
    expect(older).toMatchObject({ isCurrent: false, supersededById: record!.id });
    const { body } = await bench.get(`/api/captures/${capture.id}/records`).expect(200);
    const items = body.items as RecordSummaryDto[];
    expect(items.map(({ ordinal }) => ordinal)).toEqual([2, 1]);
    const plain = await bench.post(`/api/captures/${capture.id}/records`).send({}).expect(202);
    expect(plain.body.isNew).toBe(false);
  });

  it.each([
    [{ fromS: 1, toS: 0.5 }, 'toS'],
    [{ bandLowHz: 500, bandHighHz: 400 }, 'bandHighHz'],
    [{ fromS: 99 }, 'fromS'],
    [{ highestHarmonic: 2.5 }, 'highestHarmonic'],
    [{ measure: 'guess' }, 'measure'],
    [{ window: 'mine' }, 'window'],
  ])('refuses the settings %j', async (settings, field) => {
    const { body } = await bench.post(`/api/captures/${capture.id}/records`).send(settings).expect(400);
    expect(Object.keys(body.fields)).toEqual([field]);
  });

  it('never changes or deletes a record, its figures or its traces', async () => {
    const { dataSource } = bench;
    for (const sql of [
      `UPDATE record SET measure = 'idle'`,
      'DELETE FROM record',
      'UPDATE record_figure SET value = 0',
      'DELETE FROM record_figure',
      'UPDATE record_trace SET points = 1',
      'TRUNCATE record CASCADE',
    ]) {
      await expect(dataSource.query(sql)).rejects.toThrow('never changed');
    }
  });

  it('names the figure that was tampered with, and the file that was', async () => {
    const own = await settled((await bench.uploaded(wavBytes({ seed: 62, durationS: 1 }))).id);
    const verify = async () =>
      (await bench.post(`/api/records/${own.record!.id}/verify`).expect(200)).body as VerificationDto;
    expect(await verify()).toMatchObject({ isEqual: true, differing: [], evidence: 'sound' });

    await bench.dataSource.query('ALTER TABLE record DISABLE TRIGGER USER');
    await bench.dataSource.query(
      `UPDATE record SET content = jsonb_set(content::jsonb, '{channels,1,figures,thdDb}', '-123.5')::json WHERE id = $1`,
      [own.record!.id],
    );
    await bench.dataSource.query('ALTER TABLE record ENABLE TRIGGER USER');
    const tampered = await verify();
    expect(tampered).toMatchObject({ isEqual: false, evidence: 'sound' });
    expect(tampered.differing.map(({ path }) => path)).toEqual(['channels.1.figures.thdDb']);
    expect(tampered.differing[0]!.stored).toBe(-123.5);

    const path = join(bench.storeDir, own.sha256.slice(0, 2), own.sha256.slice(2, 4), own.sha256);
    const stored = await readFile(path);
    stored[1_000]! ^= 1;
    await writeFile(path, stored);
    expect(await verify()).toMatchObject({
      isEqual: false,
      evidence: 'damaged',
      differing: [{ path: 'capture.sha256' }],
    });
    const asked = await bench.post(`/api/captures/${own.id}/records`).send({ bandHighHz: 4_000 }).expect(202);
    expect(asked.body.isNew).toBe(true);
    expect(await settled(own.id)).toMatchObject({
      state: 'failed',
      failure: { code: 'EVIDENCE_DAMAGED' },
      record: { ordinal: 1 },
    });
  });

  it('fails a capture with a sample that is no number, saying where, and without trying again', async () => {
    const broken = await settled((await bench.uploaded(wavWithNaN(30_000, 20_000), { name: 'nan.wav' })).id);
    expect(broken).toMatchObject({
      state: 'failed',
      record: null,
      failure: { code: 'NON_FINITE_SAMPLE', attempts: 1 },
    });
    // 44 bytes of header and four bytes a frame
    expect(broken.failure!.message).toContain(String(44 + 20_000 * 4));
  });

  it('tells a page how far the analysis is while it goes on', async () => {
    const { port } = bench.server.address() as AddressInfo;
    const ending = new AbortController();
    const stream = await fetch(`http://127.0.0.1:${port}/api/events`, {
      headers: bench.as('reviewer'),
      signal: ending.signal,
    });
    expect(stream.headers.get('content-type')).toContain('text/event-stream');
    const { id } = await bench.uploaded(wavBytes({ seed: 63, durationS: 4 }));
    const states: string[] = [];
    let text = '';
    for await (const chunk of stream.body as unknown as AsyncIterable<Uint8Array>) {
      text += Buffer.from(chunk).toString('utf8');
      const events = text
        .split('\n\n')
        .slice(0, -1)
        .filter((part) => part.startsWith('event: capture'));
      const own = events
        .map((part) => JSON.parse(part.split('data: ')[1]!) as CaptureEvent)
        .filter(({ captureId }) => captureId === id);
      states.splice(0, states.length, ...own.map(({ state }) => state));
      if (states.at(-1) === 'done') {
        expect(own.at(-1)!.recordId).toEqual(expect.any(String));
        break;
      }
    }
    ending.abort();
    expect(states[0]).toBe('queued');
    expect(states).toContain('analysing');
    await request(bench.server).get('/api/events').set(bench.as('reader')).expect(403);
  });

  it('begins the stream of one capture with where it stands', async () => {
    const { port } = bench.server.address() as AddressInfo;
    const ending = new AbortController();
    const url = `http://127.0.0.1:${port}/api/captures/${capture.id}/events`;
    const stream = await fetch(url, { headers: bench.as('technician'), signal: ending.signal });
    let text = '';
    for await (const chunk of stream.body as unknown as AsyncIterable<Uint8Array>) {
      text += Buffer.from(chunk).toString('utf8');
      if (text.includes('data: ')) break;
    }
    ending.abort();
    const event = JSON.parse(/data: (.*)/.exec(text)![1]!) as CaptureEvent;
    expect(event).toMatchObject({ captureId: capture.id, state: 'done', progress: null, failure: null });
    await bench.get('/api/captures/00000000-0000-4000-8000-000000000000/events').expect(404);
  });
});

async function analyseHere(bytes: Buffer) {
  const wav = await openWav(bytesFromMemory(bytes));
  return analyseCapture(wav, createHash('sha256').update(bytes).digest('hex'), {});
}
