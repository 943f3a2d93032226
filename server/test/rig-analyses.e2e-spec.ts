import {
  analyseCapture,
  bytesFromMemory,
  openWav,
  parseCalibration,
  parseRecord,
  roundNumbers,
  type BenchRecord,
} from '@benchlark/dsp';
import type { CaptureDto } from '../src/captures/dto/capture.dto';
import type { RecordDto, VerificationDto } from '../src/records/dto/record.dto';
import type { RequestedRecordDto } from '../src/records/dto/request-record.dto';
import type { BaselineDto, BaselineListDto } from '../src/rigs/dto/baseline.dto';
import type { CalibrationDto } from '../src/rigs/dto/calibration.dto';
import type { LiveSettingsDto } from '../src/rigs/dto/live-settings.dto';
import { createBench, type Bench } from './support/bench';
import { waitFor } from './support/wait-for';
import { wavBytes } from './support/wav-bytes';
import { startWorker, type WorkerProcess } from './support/worker-process';

const facts = {
  channel: 'all',
  direction: 'input',
  range: 'pad off',
  sampleRateHz: 48_000,
  frequencyHz: 997,
  voltsRmsAtFullScale: 4,
  meter: 'bench meter 2',
  meterUncertaintyPercent: 0.2,
  takenOn: '2026-01-05',
  validUntil: '2999-01-05',
};
const tone = (seed: number, recipe = {}) => wavBytes({ seed, durationS: 1, ...recipe });

describe('analyses with what a rig has', () => {
  let bench: Bench;
  let worker: WorkerProcess;
  let rigId: string;
  let otherRigId: string;
  let unitId: string;
  let calibration: CalibrationDto;
  let baseline: BaselineDto;
  let capture: CaptureDto;

  const settled = (id: string) =>
    waitFor(
      () => bench.get(`/api/captures/${id}`).then(({ body }) => body as CaptureDto),
      ({ state }) => state === 'done' || state === 'failed',
    );
  const made = async (path: string, body: object) =>
    (await bench.post(path).send(body).expect(201)).body as { id: string };
  const recordOf = async (id: string) =>
    (await bench.get(`/api/records/${id}`).expect(200)).body as RecordDto & { record: BenchRecord };
  const ask = (id: string, body: object) => bench.post(`/api/captures/${id}/records`).send(body);
  /** Asks for an analysis and waits for its record. */
  const analysed = async (id: string, body: object) => {
    const { notes } = (await ask(id, body).expect(202)).body as RequestedRecordDto;
    const { record } = await settled(id);
    return { ...(await recordOf(record!.id)), notes };
  };
  const refusal = async (id: string, body: object) =>
    ((await ask(id, body).expect(400)).body as { fields: Record<string, string[]> }).fields;

  beforeAll(async () => {
    bench = await createBench();
    worker = await startWorker(bench);
    rigId = (await made('/api/rigs', { name: 'One' })).id;
    otherRigId = (await made('/api/rigs', { name: 'Another' })).id;
    unitId = (await made('/api/units', { maker: 'Wren', model: 'Two' })).id;
    calibration = (await made(`/api/rigs/${rigId}/calibrations`, facts)) as CalibrationDto;
    const loop = await bench.uploaded(tone(1), { fields: { rigId } });
    await settled(loop.id);
    const named = { captureId: loop.id, inputRange: 'pad off' };
    baseline = (await made(`/api/rigs/${rigId}/baselines`, named)) as BaselineDto;
    capture = await bench.uploaded(tone(2), { fields: { rigId, unitId } });
    await settled(capture.id);
  });
  afterAll(async () => {
    const { code } = await worker.end();
    await bench.close();
    expect(code).toBe(0);
  });

  it('embed calibration and baseline in full, as the Live page is given them, and verify', async () => {
    const { record, id, notes } = await analysed(capture.id, {
      calibrationId: calibration.id,
      baselineId: baseline.id,
    });
    expect(notes).toEqual([]);
    const live = (await bench.get(`/api/rigs/${rigId}/live-settings`)).body as LiveSettingsDto;
    expect(record.settings.calibration).toEqual(live.inputs[0]!.calibration);
    expect(record.settings.baseline).toEqual(live.baselines[0]!.baseline);
    expect(live.baselines).toMatchObject([{ id: baseline.id, measure: 'tone', inputRange: 'pad off' }]);
    parseCalibration(record.settings.calibration);
    expect(parseRecord(record.settings.baseline).settings.inputRange).toBe('pad off');
    // Closed form: half of full scale of 4 V is 2 V RMS; the file's 16 bits round it to 1 part in 30,000.
    expect(record.channels[0]!.figures['fundamentalLevelV']).toBeCloseTo(2, 3);
    // The same noise from the same generator in both: the unit's figures are the rig's own.
    expect(record.warnings.map(({ code }) => code)).toContain('rig-limited');
    // A browser with the embeddable objects comes to the same figures.
    const here = await analyseCapture(await openWav(bytesFromMemory(tone(2))), capture.sha256, {
      settings: {
        calibration: parseCalibration(live.inputs[0]!.calibration),
        baseline: parseRecord(live.baselines[0]!.baseline),
      },
    });
    expect(record.channels[0]!.figures).toEqual(roundNumbers(here.record.channels[0]!.figures));
    const verified = await bench.post(`/api/records/${id}/verify`).expect(200);
    expect(verified.body as VerificationDto).toMatchObject({ isEqual: true, differing: [] });
  });

  it('stay as they were when what they embed is retired and followed', async () => {
    const own = (await made(`/api/rigs/${rigId}/calibrations`, {
      ...facts,
      range: 'pad on',
    })) as CalibrationDto;
    const loop = await bench.uploaded(tone(3), { fields: { rigId } });
    await settled(loop.id);
    const named = { captureId: loop.id, inputRange: 'pad on' };
    const ownBaseline = (await made(`/api/rigs/${rigId}/baselines`, named)) as BaselineDto;
    const { id } = await bench.uploaded(tone(4), { fields: { rigId } });
    await settled(id);
    const before = await analysed(id, { calibrationId: own.id, baselineId: ownBaseline.id });
    await bench.post(`/api/rigs/${rigId}/calibrations/${own.id}/retire`).expect(200);
    await made(`/api/rigs/${rigId}/calibrations`, { ...facts, range: 'pad on', voltsRmsAtFullScale: 5 });
    // The baseline's own capture is analysed again: the baseline holds to the record it was named by.
    await analysed(loop.id, { bandHighHz: 15_000 });
    const { items } = (await bench.get(`/api/rigs/${rigId}/baselines`)).body as BaselineListDto;
    expect(items.find((entry) => entry.id === ownBaseline.id)).toMatchObject({
      hasNewerRecord: true,
      recordId: ownBaseline.recordId,
    });
    await bench.delete(`/api/rigs/${rigId}/baselines/${ownBaseline.id}`).expect(200);
    await bench.delete(`/api/rigs/${rigId}/baselines/${ownBaseline.id}`).expect(409);
    expect((await recordOf(before.id)).record).toEqual(before.record);
    const verified = await bench.post(`/api/records/${before.id}/verify`).expect(200);
    expect(verified.body as VerificationDto).toMatchObject({ isEqual: true, differing: [] });
    expect(await refusal(id, { calibrationId: own.id })).toEqual({
      calibrationId: ['is retired: choose a newer one'],
    });
    expect(await refusal(id, { baselineId: ownBaseline.id })).toEqual({
      baselineId: ['is retired: choose a newer one'],
    });
  });

  it('are refused with what belongs to another rig, is unknown, or is one of an output', async () => {
    const elsewhere = await bench.uploaded(tone(5), { fields: { rigId: otherRigId } });
    const unfiled = await bench.uploaded(tone(6));
    const unknown = '00000000-0000-4000-8000-000000000000';
    const output = await made(`/api/rigs/${rigId}/calibrations`, { ...facts, direction: 'output' });
    const named = { calibrationId: calibration.id };
    expect((await refusal(elsewhere.id, named))['calibrationId']![0]).toContain('another rig');
    expect((await refusal(elsewhere.id, { baselineId: baseline.id }))['baselineId']![0]).toContain(
      'another rig',
    );
    expect((await refusal(unfiled.id, named))['calibrationId']![0]).toContain('needs a rig');
    expect((await refusal(capture.id, { calibrationId: unknown }))['calibrationId']![0]).toContain(
      'not a known',
    );
    expect((await refusal(capture.id, { calibrationId: output.id }))['calibrationId']![0]).toContain(
      'output',
    );
    expect((await refusal(baseline.captureId, { baselineId: baseline.id }))['baselineId']![0]).toContain(
      'this very recording',
    );
  });

  it('of another rate or range are accepted, not applied, and say so', async () => {
    const fast = await bench.uploaded(tone(7, { sampleRateHz: 96_000 }), { fields: { rigId } });
    await settled(fast.id);
    const both = { calibrationId: calibration.id, baselineId: baseline.id };
    const rate = await analysed(fast.id, both);
    expect(rate.notes).toEqual([
      expect.stringMatching(/calibration holds at 48000 Hz.*not applicable/),
      expect.stringMatching(/baseline was taken at 48000 Hz.*not applicable/),
    ]);
    const codes = rate.record.warnings.map(({ code }) => code);
    expect(codes).toContain('calibration-not-applicable');
    expect(codes).toContain('baseline-not-applicable');
    expect(rate.record.channels[0]!.figures).not.toHaveProperty('fundamentalLevelV');
    const high = await made(`/api/rigs/${rigId}/calibrations`, {
      ...facts,
      range: 'high gain',
      takenOn: '2020-01-01',
      validUntil: '2021-01-01',
    });
    const range = await analysed(capture.id, { calibrationId: high.id, baselineId: baseline.id });
    expect(range.notes).toEqual([
      expect.stringContaining('had run out on 2021-01-01'),
      expect.stringMatching(/“pad off”.*“high gain”.*not applicable/),
    ]);
    expect(range.record.warnings.find(({ code }) => code === 'baseline-not-applicable')?.message).toContain(
      '“pad off”',
    );
    expect(range.record.channels[0]!.figures).toHaveProperty('fundamentalLevelV');
  });

  it('come with a take that names them, and the take keeps the names', async () => {
    const settings = { calibrationId: calibration.id, baselineId: baseline.id };
    const end = { label: 'desk', sampleRateHz: 48_000, channelCount: 2 };
    const take = {
      schema: 'benchlark-take/1',
      kind: 'sine',
      measure: 'tone',
      settings,
      startedAt: '2026-11-30T14:02:11.000Z',
      isPractice: false,
      input: end,
      output: end,
      breaks: [],
      notes: [],
      series: null,
    };
    const fields = { take: JSON.stringify(take), rigId, unitId };
    const taken = await settled((await bench.uploaded(tone(8), { fields })).id);
    expect(taken.take!.settings).toEqual(settings);
    const { record } = await recordOf(taken.record!.id);
    expect(record.settings.calibration).toMatchObject({ inputRange: 'pad off' });
    expect(record.settings.baseline).toMatchObject({ measure: 'tone' });
    const elsewhere = await bench.upload(tone(9), { fields: { ...fields, rigId: otherRigId } }).expect(400);
    expect((elsewhere.body as { fields: object }).fields).toHaveProperty('calibrationId');
  });

  it('know a baseline by a loopback of the rig alone', async () => {
    const name = async (captureId: string, rig = rigId) => {
      const answer = await bench
        .post(`/api/rigs/${rig}/baselines`)
        .send({ captureId, inputRange: 'pad off' })
        .expect(400);
      return (answer.body as { fields: { captureId: string[] } }).fields.captureId[0];
    };
    expect(await name(capture.id)).toContain('recording of a unit');
    expect(await name(baseline.captureId, otherRigId)).toContain('another rig');
    expect(await name('00000000-0000-4000-8000-000000000000')).toContain('not a known recording');
    const again = { captureId: baseline.captureId, inputRange: 'pad off' };
    await bench.post(`/api/rigs/${rigId}/baselines`).send(again).expect(409);
  });
});
