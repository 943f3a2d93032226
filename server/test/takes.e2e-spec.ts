import {
  analyseCapture,
  bytesFromMemory,
  createStimulus,
  encodeWav,
  openWav,
  PRACTICE_DESCRIPTION,
  roundNumbers,
} from '@benchlark/dsp';
import type { CaptureDto, CaptureListDto } from '../src/captures/dto/capture.dto';
import type { RecordDto, VerificationDto } from '../src/records/dto/record.dto';
import { createBench, type Bench } from './support/bench';
import { waitFor } from './support/wait-for';
import { wavBytes } from './support/wav-bytes';
import { startWorker, type WorkerProcess } from './support/worker-process';

/** A ladder of its own levels: only its descriptor tells them. */
async function makeTake() {
  const stimulus = createStimulus('level-steps', {
    sampleRateHz: 48_000,
    bitsPerSample: '32f',
    levelDbfs: -12,
    isBare: true,
  });
  const channels = await stimulus.source.read(0, stimulus.source.frameCount);
  const bytes = Buffer.from(
    encodeWav(channels, {
      bits: '32f',
      dither: 'none',
      seed: 0,
      sampleRateHz: 48_000,
      broadcast: { description: `${PRACTICE_DESCRIPTION} Level steps.` },
    }),
  );
  const take = {
    schema: 'benchlark-take/1',
    kind: 'level-steps',
    measure: 'level-steps',
    settings: { bandHighHz: 16_000, descriptor: stimulus.describe('') },
    startedAt: '2026-11-30T14:02:11.000Z',
    isPractice: false,
    input: { label: 'practice device', sampleRateHz: 48_000, channelCount: 2, resolution: '32-bit float' },
    output: { label: 'practice device', sampleRateHz: 48_000, channelCount: 2 },
    breaks: [],
    notes: [{ atS: 3.2, text: 'lid off' }],
    series: null,
  };
  return { bytes, take };
}

describe('takes', () => {
  let bench: Bench;
  let worker: WorkerProcess;
  beforeAll(async () => {
    bench = await createBench();
    worker = await startWorker(bench);
  });
  afterAll(async () => {
    const { code } = await worker.end();
    await bench.close();
    expect(code).toBe(0);
  });

  it('are measured first as they were taken, with what was played, and verify', async () => {
    const { bytes, take } = await makeTake();
    const { id } = await bench.uploaded(bytes, { fields: { take: JSON.stringify(take) } });
    const capture = await waitFor(
      () => bench.get(`/api/captures/${id}`).then(({ body }) => body as CaptureDto),
      ({ state }) => state === 'done' || state === 'failed',
    );
    expect(capture).toMatchObject({ state: 'done', take: { kind: 'level-steps', notes: take.notes } });
    const { record, id: recordId } = (await bench.get(`/api/records/${capture.record!.id}`).expect(200))
      .body as RecordDto;
    // The same function in this process is the other place where a take is computed: not one key may differ.
    const wav = await openWav(bytesFromMemory(bytes));
    const here = await analyseCapture(wav, capture.sha256, {
      measure: 'level-steps',
      settings: take.settings,
    });
    expect(record).toMatchObject({
      measure: 'level-steps',
      settings: { bandHighHz: 16_000, descriptor: { name: 'level-steps' } },
      stimulus: { recognisedBy: 'descriptor' },
      capture: { isPractice: true },
    });
    expect((record as unknown as typeof here.record).channels[0]!.figures).toEqual(
      roundNumbers(here.record.channels[0]!.figures),
    );
    const verified = await bench.post(`/api/records/${recordId}/verify`).expect(200);
    expect(verified.body as VerificationDto).toMatchObject({ isEqual: true, differing: [] });
  });

  it('of a practice device are known by the file itself, whatever the form says', async () => {
    const { bytes } = await makeTake();
    expect(await bench.uploaded(bytes, { name: 'again.wav' })).toMatchObject({
      isPractice: true,
      take: null,
    });
    expect(await bench.uploaded(wavBytes({ seed: 91 }))).toMatchObject({ isPractice: false, take: null });
  });

  it.each([
    ['{', 'is not JSON'],
    [JSON.stringify({ schema: 'benchlark-take/2' }), 'schema'],
    ['of settings that cross', 'settings.toS'],
    ['of a foreign descriptor', 'settings.descriptor'],
  ])('%s is refused, and nothing is kept', async (text, named) => {
    const { take } = await makeTake();
    const sent = {
      'of settings that cross': JSON.stringify({ ...take, settings: { fromS: 3, toS: 2 } }),
      'of a foreign descriptor': JSON.stringify({ ...take, settings: { descriptor: { schema: 'x' } } }),
    }[text];
    const count = async () => ((await bench.get('/api/captures')).body as CaptureListDto).totalAll;
    const before = await count();
    const answer = await bench.upload(wavBytes({ seed: 92 }), { fields: { take: sent ?? text } }).expect(400);
    expect((answer.body as { fields: { take: string[] } }).fields.take[0]).toContain(named);
    expect(await count()).toBe(before);
  });
});
