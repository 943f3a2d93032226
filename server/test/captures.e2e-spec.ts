import type { CaptureDto, CaptureListDto } from '../src/captures/dto/capture.dto';
import { createBench, type Bench } from './support/bench';
import { wavBytes } from './support/wav-bytes';

const COUNT = 137;
const MEASURES = ['', 'tone', 'idle', 'dynamic-range'];
const STATES = ['queued', 'analysing', 'done', 'failed', 'cancelled'];

/** The same captures as the database holds, to filter by hand. */
interface Plain {
  number: number;
  fileName: string;
  sizeBytes: number;
  durationS: number;
  measure: string;
  state: string;
  unitKey: string;
  hasWarnings: boolean;
  uploadedAt: string;
}

describe('captures', () => {
  let bench: Bench;
  let captures: Plain[];
  let unitIds: string[];

  beforeAll(async () => {
    bench = await createBench();
    unitIds = [];
    for (const [maker, model] of [
      ['Kestrel', 'One'],
      ['Ärger', 'Zwölf'],
    ] as const) {
      unitIds.push((await bench.post('/api/units').send({ maker, model }).expect(201)).body.id);
    }
    const { dataSource, personId } = bench;
    await dataSource.query(
      `INSERT INTO stored_object (sha256, size_bytes, kind) VALUES (repeat('a', 64), 1, 'capture')`,
    );
    // Many equal values in every column, so that the order within them is tried as well.
    await dataSource.query(
      `INSERT INTO capture (file_name, file_name_key, sha256, size_bytes, uploaded_at, uploaded_by, unit_id,
         sample_rate_hz, channel_count, bits_per_sample, sample_format, frame_count, duration_s, file_warnings, state,
         measure, has_warnings, unit_key, search)
       SELECT name, lower(name), repeat('a', 64), 100 + n % 7, '2026-01-01Z'::timestamptz + (n % 11) * interval '1 day', $1,
         (ARRAY[NULL, $2, $3]::uuid[])[1 + n % 3], 48000, 2, 24, 'integer', 100, (n % 5) + 0.1, '[]',
         ($4::text[])[1 + n % 5], ($5::text[])[1 + n % 4], n % 6 = 0,
         (ARRAY['', 'kestrel one', 'ärger zwölf'])[1 + n % 3],
         lower('#' || n || ' ' || name || ' ' || (ARRAY['', 'kestrel one', 'ärger zwölf'])[1 + n % 3])
       FROM (SELECT n, (ARRAY['Take ', 'hum_100% ', 'Übung '])[1 + n % 3] || n % 20 || '.wav' AS name
             FROM generate_series(1, ${COUNT}) AS n) AS made`,
      [personId, unitIds[0], unitIds[1], STATES, MEASURES],
    );
    captures = await dataSource.query(
      `SELECT number, file_name AS "fileName", size_bytes::int AS "sizeBytes", duration_s AS "durationS", measure, state,
         unit_key AS "unitKey", has_warnings AS "hasWarnings", uploaded_at::text AS "uploadedAt" FROM capture`,
    );
  });
  afterAll(() => bench.close());

  const list = async (query: string) =>
    (await bench.get(`/api/captures?${query}`).expect(200)).body as CaptureListDto;
  const pageThrough = async (query: string) => {
    const items: CaptureDto[] = [];
    let cursor: string | null = null;
    do {
      const page: CaptureListDto = await list(`${query}&limit=20${cursor ? `&cursor=${cursor}` : ''}`);
      items.push(...page.items);
      cursor = page.nextCursor;
    } while (cursor !== null);
    return items.map(({ number }) => number);
  };
  const keys: Record<string, (capture: Plain) => string | number> = {
    number: ({ number }) => number,
    uploadedAt: ({ uploadedAt }) => uploadedAt,
    fileName: ({ fileName }) => fileName.toLowerCase(),
    sizeBytes: ({ sizeBytes }) => sizeBytes,
    durationS: ({ durationS }) => durationS,
    unit: ({ unitKey }) => unitKey,
    measure: ({ measure }) => measure,
  };
  const ordered = (chosen: Plain[], sort: string, order: string) => {
    const key = keys[sort]!;
    const compare = (a: string | number, b: string | number) =>
      typeof a === 'string' ? Buffer.compare(Buffer.from(a), Buffer.from(String(b))) : a - Number(b);
    const sign = order === 'asc' ? 1 : -1;
    return [...chosen]
      .sort((a, b) => sign * (compare(key(a), key(b)) || a.number - b.number))
      .map(({ number }) => number);
  };

  it.each(Object.keys(keys).flatMap((sort) => [[sort, 'asc'] as const, [sort, 'desc'] as const]))(
    'pages through all by %s %s in the order a plain sort gives',
    async (sort, order) => {
      expect(await pageThrough(`sort=${sort}&order=${order}`)).toEqual(ordered(captures, sort, order));
    },
  );

  it.each<[string, (capture: Plain) => boolean]>([
    ['state=failed', ({ state }) => state === 'failed'],
    ['measure=idle', ({ measure }) => measure === 'idle'],
    ['unsorted=true', ({ unitKey }) => unitKey === ''],
    ['unsorted=false&hasWarnings=true', ({ unitKey, hasWarnings }) => unitKey !== '' && hasWarnings],
    ['hasWarnings=false&state=done', ({ hasWarnings, state }) => !hasWarnings && state === 'done'],
    ['q=KESTREL%20take', ({ unitKey, fileName }) => unitKey === 'kestrel one' && /take/i.test(fileName)],
    ['q=%25', ({ fileName }) => fileName.includes('%')],
    ['q=_1', ({ fileName }) => fileName.includes('_1')],
    ['q=%C3%9Cbung', ({ fileName }) => fileName.startsWith('Übung')],
    ['q=%5C', () => false],
    [
      'since=2026-01-03T00:00:00Z&until=2026-01-06T00:00:00Z',
      ({ uploadedAt }) =>
        new Date(uploadedAt) >= new Date('2026-01-03Z') && new Date(uploadedAt) < new Date('2026-01-06Z'),
    ],
  ])('filters by %s as a plain filter does', async (query, holds) => {
    const chosen = captures.filter(holds);
    expect(await pageThrough(query)).toEqual(ordered(chosen, 'number', 'desc'));
    const { total, totalAll, totalBytes } = await list(query);
    const bytes = captures.reduce((sum, { sizeBytes }) => sum + sizeBytes, 0);
    expect({ total, totalAll, totalBytes }).toEqual({
      total: chosen.length,
      totalAll: COUNT,
      totalBytes: bytes,
    });
  });

  it.each([
    'sort=id;select%20pg_sleep(3)--',
    'order=ASC%20NULLS%20FIRST',
    'limit=-1',
    'limit=2147483648',
    'cursor=nonsense',
    `cursor=${Buffer.from(JSON.stringify(['number desc', "1'; DROP TABLE capture", '1'])).toString('base64url')}`,
    'unitId=1',
    'ids[]=1',
    'state[]=done',
    'since=yesterday',
    'q=a%00b',
  ])('refuses the query %s', async (query) => {
    const answer = await bench.get(`/api/captures?${query}`);
    expect(answer.status).toBe(400);
  });

  it('refuses a cursor of another order', async () => {
    const { nextCursor } = await list('sort=fileName&limit=5');
    await bench.get(`/api/captures?sort=sizeBytes&limit=5&cursor=${nextCursor}`).expect(400);
  });

  it('files a capture, searches it by its new unit, and clears it again', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 31 }), { name: 'filed.wav' });
    const condition = (
      await bench
        .post(`/api/units/${unitIds[0]}/conditions`)
        .send({ name: 'Supply B', startedOn: '2026-02-03' })
        .expect(201)
    ).body;
    const other = (
      await bench.post(`/api/units/${unitIds[1]}/conditions`).send({ name: 'as received' }).expect(201)
    ).body;
    const rig = (await bench.post('/api/rigs').send({ name: 'Bench rig' }).expect(201)).body;
    const filed = (
      await bench
        .patch(`/api/captures/${id}`)
        .send({ conditionId: condition.id, rigId: rig.id, note: 'Warm' })
        .expect(200)
    ).body as CaptureDto;
    expect(filed).toMatchObject({
      unit: { id: unitIds[0] },
      condition: { name: 'Supply B' },
      rig: { name: 'Bench rig' },
      note: 'Warm',
    });
    expect((await list('q=supply%20warm%20kestrel%20rig')).items.map((capture) => capture.id)).toEqual([id]);
    await bench.patch(`/api/captures/${id}`).send({ conditionId: other.id, unitId: unitIds[0] }).expect(400);
    await bench.patch(`/api/units/${unitIds[0]}`).send({ model: 'Renamed' }).expect(200);
    expect((await list('q=renamed%20filed.wav')).total).toBe(1);
    const moved = (await bench.patch(`/api/captures/${id}`).send({ unitId: unitIds[1] }).expect(200))
      .body as CaptureDto;
    expect(moved).toMatchObject({ unit: { id: unitIds[1] }, condition: null });
    const cleared = (await bench.patch(`/api/captures/${id}`).send({ unitId: null, rigId: null }).expect(200))
      .body as CaptureDto;
    expect(cleared).toMatchObject({ unit: null, condition: null, rig: null, note: 'Warm' });
    await bench
      .patch(`/api/captures/${id}`)
      .send({ sha256: 'b'.repeat(64) })
      .expect(400);
  });

  it('never changes or deletes what a capture is', async () => {
    const { id } = await bench.uploaded(wavBytes({ seed: 32, durationS: 0.05 }));
    for (const change of [
      `sha256 = repeat('a', 64)`,
      `file_name = 'x'`,
      'duration_s = 1',
      'number = 99999',
    ]) {
      await expect(
        bench.dataSource.query(`UPDATE capture SET ${change} WHERE id = $1`, [id]),
      ).rejects.toThrow('never changed');
    }
    await expect(bench.dataSource.query('DELETE FROM capture WHERE id = $1', [id])).rejects.toThrow(
      'never changed',
    );
  });

  it('tells what waits today', async () => {
    const { body } = await bench.get('/api/today').expect(200);
    expect(body.unsorted.count).toBeGreaterThan(40);
    expect(body.unsorted.captures).toHaveLength(5);
    expect(body.failed.count).toBe(captures.filter(({ state }) => state === 'failed').length);
    expect(body.log[0]).toMatchObject({
      text: expect.stringContaining('archived'),
      actorName: 'Test technician',
    });
  });
});
