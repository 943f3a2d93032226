import { RigCalibration } from '../src/rigs/rig-calibration.entity';
import type { CalibrationDto, CalibrationListDto } from '../src/rigs/dto/calibration.dto';
import type { LiveSettingsDto } from '../src/rigs/dto/live-settings.dto';
import type { RigDto } from '../src/rigs/dto/rig.dto';
import { createBench, type Bench } from './support/bench';
import { wavBytes } from './support/wav-bytes';

const NOWHERE = '00000000-0000-4000-8000-000000000000';
const day = (fromToday: number): string =>
  new Date(Date.now() + fromToday * 86_400_000).toISOString().slice(0, 10);

const facts = {
  channel: 'all',
  direction: 'input',
  range: 'pad off',
  sampleRateHz: 48_000,
  frequencyHz: 997,
  voltsRmsAtFullScale: 3.52,
  dividerRatio: 10,
  meter: 'bench meter 2',
  meterUncertaintyPercent: 0.5,
  takenOn: day(-10),
  validUntil: day(300),
};

describe('rigs', () => {
  let bench: Bench;
  let names = 0;
  beforeAll(async () => {
    bench = await createBench();
  });
  afterAll(() => bench.close());
  const makeRig = async (body: object = {}) =>
    (
      await bench
        .post('/api/rigs')
        .send({ name: `Rig ${(names += 1)}`, ...body })
        .expect(201)
    ).body as RigDto;
  const calibrate = async (rigId: string, change: object = {}) =>
    (
      await bench
        .post(`/api/rigs/${rigId}/calibrations`)
        .send({ ...facts, ...change })
        .expect(201)
    ).body as CalibrationDto;
  const trail = async (action: string) =>
    bench.dataSource.query<{ subject: string; actor_name: string }[]>(
      'SELECT subject, actor_name FROM audit_entry WHERE action = $1 ORDER BY id',
      [action],
    );

  it('keeps the facts of a rig, and who changed them', async () => {
    const rig = await makeRig({ interface: ' Gannet 2 ', load: '33 ohm', limitDbfs: -6 });
    expect(rig).toMatchObject({
      interface: 'Gannet 2',
      source: '',
      load: '33 ohm',
      limitDbfs: -6,
      captureCount: 0,
      calibrationState: 'none',
      calibratedUntil: null,
    });
    const body = { cables: 'balanced', limitDbfs: null };
    const changed = (await bench.patch(`/api/rigs/${rig.id}`).send(body).expect(200)).body as RigDto;
    expect(changed).toEqual({ ...rig, ...body });
    expect((await bench.get(`/api/rigs/${rig.id}`).expect(200)).body).toEqual(changed);
    expect(await trail('rig.changed')).toContainEqual({
      subject: `rig:${rig.id}`,
      actor_name: 'Test technician',
    });
    await bench.get(`/api/rigs/${NOWHERE}`).expect(404);
  });

  it.each([
    [{ limitDbfs: 0.1 }, 'limitDbfs'],
    [{ limitDbfs: '-6' }, 'limitDbfs'],
    [{ interface: 'x'.repeat(201) }, 'interface'],
    [{ load: 'two\nlines' }, 'load'],
    [{ id: NOWHERE }, 'id'],
  ])('refuses %j', async (body, field) => {
    const { id } = await makeRig();
    const answer = await bench.patch(`/api/rigs/${id}`).send(body).expect(400);
    expect(Object.keys((answer.body as { fields: object }).fields)).toEqual([field]);
  });

  it('finds captures by the new name of their rig', async () => {
    const { id } = await makeRig({ name: 'Old name' });
    await bench.uploaded(wavBytes({ seed: 40, durationS: 0.05 }), { fields: { rigId: id } });
    await bench.patch(`/api/rigs/${id}`).send({ name: 'Corner table' }).expect(200);
    expect((await bench.get('/api/captures?q=corner')).body).toMatchObject({ total: 1 });
    expect((await bench.get('/api/captures?q=old%20name')).body).toMatchObject({ total: 0 });
    await bench
      .patch(`/api/rigs/${(await makeRig()).id}`)
      .send({ name: 'Corner table' })
      .expect(409);
  });

  it('enters a calibration with the divider counted in', async () => {
    const { id } = await makeRig();
    const made = await calibrate(id);
    expect(made).toMatchObject({
      ...facts,
      fullScaleVrms: 35.2,
      state: 'valid',
      isFollowed: false,
      loadOhm: null,
    });
    expect(made.createdBy.displayName).toBe('Test technician');
    expect((await bench.get(`/api/rigs/${id}`)).body).toMatchObject({
      calibrationState: 'valid',
      calibratedUntil: facts.validUntil,
    });
    expect(await trail('calibration.made')).toContainEqual(
      expect.objectContaining({ subject: `calibration:${made.id}` }),
    );
    await bench.post(`/api/rigs/${NOWHERE}/calibrations`).send(facts).expect(404);
    await bench.get(`/api/rigs/${NOWHERE}/calibrations`).expect(404);
  });

  it.each([
    [{ voltsRmsAtFullScale: 0 }, 'voltsRmsAtFullScale'],
    [{ voltsRmsAtFullScale: null }, 'voltsRmsAtFullScale'],
    [{ dividerRatio: 0.5 }, 'dividerRatio'],
    [{ channel: 'middle' }, 'channel'],
    [{ takenOn: '2026-02-30' }, 'takenOn'],
    [{ takenOn: day(3), validUntil: day(9) }, 'takenOn'],
    [{ validUntil: day(-11) }, 'validUntil'],
    [{ meterUncertaintyPercent: -1 }, 'meterUncertaintyPercent'],
    [{ range: ' ' }, 'range'],
  ])('refuses a calibration with %j', async (change, field) => {
    const { id } = await makeRig();
    const answer = await bench
      .post(`/api/rigs/${id}/calibrations`)
      .send({ ...facts, ...change })
      .expect(400);
    expect(Object.keys((answer.body as { fields: object }).fields)).toEqual([field]);
  });

  it('retires a calibration once, and lets nothing else of it change', async () => {
    const { id } = await makeRig();
    const made = await calibrate(id);
    const rows = bench.dataSource.getRepository(RigCalibration);
    await expect(rows.update({ id: made.id }, { voltsRmsAtFullScale: 4 })).rejects.toThrow(
      'can only be retired',
    );
    await expect(rows.delete({ id: made.id })).rejects.toThrow('never changed or deleted');
    const retire = (rigId: string) => bench.post(`/api/rigs/${rigId}/calibrations/${made.id}/retire`);
    await retire((await makeRig()).id).expect(404);
    expect((await retire(id).expect(200)).body).toMatchObject({
      state: 'retired',
      retiredAt: expect.any(String),
    });
    await retire(id).expect(409);
    await expect(rows.update({ id: made.id }, { retiredAt: null, retiredById: null })).rejects.toThrow(
      'can only be retired',
    );
    expect((await bench.get(`/api/rigs/${id}`)).body).toMatchObject({ calibrationState: 'none' });
    expect(await trail('calibration.retired')).toContainEqual(
      expect.objectContaining({ subject: `calibration:${made.id}` }),
    );
  });

  it('takes no baseline from a recording that is not analysed yet', async () => {
    const { id } = await makeRig();
    // No worker runs here: the recording waits.
    const capture = await bench.uploaded(wavBytes({ seed: 41, durationS: 0.05 }), { fields: { rigId: id } });
    const body = { captureId: capture.id, inputRange: 'pad off' };
    const answer = await bench.post(`/api/rigs/${id}/baselines`).send(body).expect(400);
    expect((answer.body as { fields: { captureId: string[] } }).fields.captureId[0]).toContain(
      'no record yet',
    );
    expect((await bench.get(`/api/rigs/${id}/baselines`).expect(200)).body).toEqual({ items: [] });
  });

  it('gives the Live page what is in force, one channel joined to the other', async () => {
    const { id } = await makeRig({ limitDbfs: -3 });
    await calibrate(id, { range: 'run out', takenOn: day(-400), validUntil: day(-1) });
    const older = await calibrate(id, { takenOn: day(-20) });
    const newer = await calibrate(id);
    const left = await calibrate(id, { range: 'pad on', channel: 'left', dividerRatio: 1 });
    await calibrate(id, { range: 'pad on', channel: 'right', voltsRmsAtFullScale: 3.5, dividerRatio: 1 });
    const output = await calibrate(id, { direction: 'output', voltsRmsAtFullScale: 2, dividerRatio: 1 });
    const live = (await bench.get(`/api/rigs/${id}/live-settings`).expect(200)).body as LiveSettingsDto;
    expect(live.limitDbfs).toBe(-3);
    expect(live.inputs.map((entry) => entry.id).sort()).toEqual([newer.id, left.id].sort());
    expect(live.outputs.map((entry) => entry.id)).toEqual([output.id]);
    expect(live.inputs.find((entry) => entry.id === left.id)?.calibration).toEqual({
      schema: 'benchlark-calibration/1',
      date: facts.takenOn,
      sampleRateHz: 48_000,
      inputRange: 'pad on',
      channels: [
        { channel: 'left', fullScaleVrms: 3.52, expandedPercent: 0.5 },
        { channel: 'right', fullScaleVrms: 3.5, expandedPercent: 0.5 },
      ],
    });
    const { items } = (await bench.get(`/api/rigs/${id}/calibrations`)).body as CalibrationListDto;
    expect(items.find((entry) => entry.id === older.id)).toMatchObject({ state: 'valid', isFollowed: true });
    expect(items.find(({ range }) => range === 'run out')).toMatchObject({
      state: 'expired',
      isFollowed: false,
    });
  });
});
