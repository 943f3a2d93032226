import request from 'supertest';
import { BenchService } from '../src/bench/bench.service';
import { Browser, createPerson, GOOD_PASSWORD, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

describe('the first administrator', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());

  const wish = {
    benchName: 'Harbour Lane',
    displayName: 'Ada Quill',
    email: 'ada@example.org',
    password: GOOD_PASSWORD,
  };
  const setUp = async (secret: string) => {
    const browser = new Browser(testApp.server);
    await browser.visit();
    return browser.send('post', '/api/setup', { ...wish, secret });
  };

  it('is made with the newest secret only, once, and by one of many', async () => {
    const bench = testApp.app.get(BenchService, { strict: false });
    const older = await bench.makeSetupSecret();
    const secret = await bench.makeSetupSecret();
    expect(Buffer.from(secret ?? '', 'base64url').length).toBeGreaterThanOrEqual(16); // 128 bits
    const stored = await testApp.dataSource.query('SELECT * FROM bench');
    expect(JSON.stringify(stored)).not.toContain(secret);
    expect((await request(testApp.server).get('/api/session')).body).toMatchObject({
      firstRun: true,
      person: null,
    });

    expect((await setUp(older ?? '')).body).toMatchObject({ status: 403, code: 'WRONG_SECRET' });
    const answers = await Promise.all(Array.from({ length: 10 }, () => setUp(secret ?? '')));
    expect(answers.map(({ status }) => status).sort()).toEqual([201, ...Array<number>(9).fill(404)]);
    expect(answers.find(({ status }) => status === 201)?.body).toMatchObject({
      firstRun: false,
      benchName: 'Harbour Lane',
      person: { roles: ['administrator', 'reviewer', 'technician'] },
    });
    expect((await setUp(secret ?? '')).status).toBe(404);
    expect(await bench.makeSetupSecret()).toBeNull();
  });

  it.each(['admin', 'password', 'benchlark'])(
    'is nobody by default: admin with %s gets nowhere',
    async (password) => {
      expect((await new Browser(testApp.server).signIn('admin@example.org', password)).status).toBe(401);
    },
  );
});

describe('people', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());

  it('keep at least one administrator, also when two demote one another at the same moment', async () => {
    const [one, other] = [await signedIn(testApp, 'administrator'), await signedIn(testApp, 'administrator')];
    const answers = await Promise.all([
      one.browser.send('patch', `/api/people/${other.id}`, { roles: ['reader'] }),
      other.browser.send('patch', `/api/people/${one.id}`, { isDisabled: true }),
    ]);
    const left = await testApp.dataSource.query(
      `SELECT 1 FROM person_role r JOIN person p ON p.id = r.person_id WHERE role = 'administrator' AND NOT is_disabled`,
    );
    expect(left).toHaveLength(1);
    expect(answers.filter(({ status }) => status === 200)).toHaveLength(1);
  });

  it('can’t give themselves anything through their own page', async () => {
    const { browser, id } = await signedIn(testApp, 'reader');
    for (const field of ['roles', 'id', 'createdAt', 'isDisabled', 'email']) {
      const answer = await browser.send('patch', '/api/me', { [field]: ['administrator'] });
      expect(answer.body).toMatchObject({ status: 400, fields: { [field]: expect.any(Array) } });
    }
    expect((await browser.send('get', '/api/me')).body).toMatchObject({ id, roles: ['reader'] });
  });

  it.each([
    ['__proto__', '{"displayName":"Isla","__proto__":{"roles":["administrator"]}}'],
    ['constructor', '{"displayName":"Isla","constructor":{"prototype":{"roles":["administrator"]}}}'],
    ['U+0000', '{"displayName":"Is\\u0000la"}'],
    ['a line break', '{"displayName":"Isla\\r\\nBcc: x@y.example"}'],
    ['a number', '{"displayName":7}'],
    ['a list', '{"displayName":["Isla"]}'],
    ['an object', '{"displayName":{"a":1}}'],
    ['half a document', '{"displayName":"Is'],
  ])('are not renamed by a body with %s', async (_, body) => {
    const { browser } = await signedIn(testApp, 'reader');
    const answer = await browser.agent
      .patch('/api/me')
      .set({ 'x-csrf-token': browser.csrfToken, 'Content-Type': 'application/json' })
      .send(body);
    expect(answer.status).toBe(400);
    expect(answer.type).toBe('application/problem+json');
    expect((await browser.send('get', '/api/me')).body).toMatchObject({
      displayName: 'Wren Calloway',
      roles: ['reader'],
    });
  });

  it('are found by name and address, % and _ meaning themselves', async () => {
    const { browser } = await signedIn(testApp, 'administrator');
    await createPerson(testApp.dataSource, ['reader'], {
      displayName: '100%_sure',
      email: 'sure@example.org',
    });
    const find = async (q: string) => {
      const { body } = await browser.send('get', `/api/people?q=${encodeURIComponent(q)}`).expect(200);
      return (body as { items: { email: string }[] }).items.map(({ email }) => email);
    };
    expect(await find('SURE@')).toEqual(['sure@example.org']);
    expect(await find('100%_')).toEqual(['sure@example.org']);
    expect(await find('1_0')).toEqual([]);
    expect(await find(`' OR 1=1 --`)).toEqual([]);
  });
});
