import type { UnitDetailDto, UnitListDto } from '../src/units/dto/unit.dto';
import { createBench, type Bench } from './support/bench';
import { wavBytes } from './support/wav-bytes';

describe('units', () => {
  let bench: Bench;
  beforeAll(async () => {
    bench = await createBench();
  });
  afterAll(() => bench.close());
  const create = async (body: object) =>
    (await bench.post('/api/units').send(body).expect(201)).body as UnitDetailDto;
  const list = async (query: string) =>
    (await bench.get(`/api/units?${query}`).expect(200)).body as UnitListDto;

  it('keeps a unit as it was written, without outer spaces', async () => {
    const unit = await create({
      maker: ' Kestrel ',
      model: 'One',
      serialNumber: '0042',
      kind: 'converter',
      notes: 'On loan',
    });
    expect(unit).toMatchObject({
      maker: 'Kestrel',
      model: 'One',
      serialNumber: '0042',
      kind: 'converter',
      notes: 'On loan',
      captureCount: 0,
      conditions: [],
    });
    const changed = (
      await bench.patch(`/api/units/${unit.id}`).send({ serialNumber: null, notes: '' }).expect(200)
    ).body;
    expect(changed).toMatchObject({ maker: 'Kestrel', serialNumber: null, notes: '' });
  });

  it.each([
    [{ model: 'One' }, 'maker'],
    [{ maker: '   ', model: 'One' }, 'maker'],
    [{ maker: 'A', model: 'B', kind: 'toaster' }, 'kind'],
    [{ maker: 'A', model: 'B', id: 'mine' }, 'id'],
    [{ maker: 'A', model: ['B'] }, 'model'],
    [{ maker: 'A\u0000', model: 'B' }, 'maker'],
    [{ maker: 'A', model: 'x'.repeat(121) }, 'model'],
  ])('refuses %j', async (body, field) => {
    const answer = await bench.post('/api/units').send(body).expect(400);
    expect(Object.keys(answer.body.fields)).toContain(field);
  });

  it('counts captures by unit and condition', async () => {
    const { id } = await create({ maker: 'Wren', model: 'Two' });
    const first = (
      await bench
        .post(`/api/units/${id}/conditions`)
        .send({ name: 'as received', startedOn: '2026-01-05' })
        .expect(201)
    ).body;
    await bench.post(`/api/units/${id}/conditions`).send({ name: 'as received' }).expect(409);
    await bench.post(`/api/units/${id}/conditions`).send({ name: 'x', startedOn: '2026-02-30' }).expect(400);
    await bench.uploaded(wavBytes({ seed: 1, durationS: 0.05 }), { fields: { conditionId: first.id } });
    await bench.uploaded(wavBytes({ seed: 2, durationS: 0.05 }), { fields: { unitId: id } });
    const unit = (await bench.get(`/api/units/${id}`).expect(200)).body as UnitDetailDto;
    expect(unit).toMatchObject({
      captureCount: 2,
      captureCountWithoutCondition: 1,
      lastCaptureAt: expect.any(String),
    });
    expect(unit.conditions).toMatchObject([
      { name: 'as received', startedOn: '2026-01-05', captureCount: 1 },
    ]);
    const renamed = (
      await bench.patch(`/api/conditions/${first.id}`).send({ name: 'on arrival' }).expect(200)
    ).body;
    expect(renamed).toMatchObject({ name: 'on arrival', startedOn: '2026-01-05', captureCount: 1 });
    expect((await bench.get('/api/captures?q=arrival')).body.total).toBe(1);
  });

  it('pages through units by name and finds them by any word', async () => {
    for (let n = 0; n < 12; n++)
      await create({ maker: 'Paged', model: `M${String(n).padStart(2, '0')} 100%` });
    const first = await list('q=paged&limit=5');
    expect(first.total).toBe(12);
    const second = await list(`q=paged&limit=5&cursor=${first.nextCursor}`);
    const third = await list(`q=paged&limit=5&cursor=${second.nextCursor}`);
    const models = [first, second, third].flatMap(({ items }) => items.map(({ model }) => model.slice(0, 3)));
    expect(models).toEqual(Array.from({ length: 12 }, (_, n) => `M${String(n).padStart(2, '0')}`));
    expect(third.nextCursor).toBeNull();
    expect((await list('q=m07%20100%25')).total).toBe(1);
    await bench.get('/api/units?cursor=zzz').expect(400);
  });

  it('answers 404 for what is not there', async () => {
    const nowhere = '00000000-0000-4000-8000-000000000000';
    await bench.get(`/api/units/${nowhere}`).expect(404);
    await bench.get('/api/units/1').expect(404);
    await bench.patch(`/api/units/${nowhere}`).send({ maker: 'A' }).expect(404);
    await bench.post(`/api/units/${nowhere}/conditions`).send({ name: 'A' }).expect(404);
    await bench.patch(`/api/conditions/${nowhere}`).send({ name: 'A' }).expect(404);
  });

  it('keeps rigs, each name once', async () => {
    const rig = (await bench.post('/api/rigs').send({ name: 'Bench A', notes: 'short cables' }).expect(201))
      .body;
    expect(rig).toMatchObject({ name: 'Bench A', notes: 'short cables' });
    await bench.post('/api/rigs').send({ name: 'Bench A' }).expect(409);
    expect((await bench.get('/api/rigs').expect(200)).body.items).toEqual([rig]);
  });
});
