import { argon2id, hash } from 'argon2';
import request from 'supertest';
import { Person } from '../src/people/person.entity';
import { Browser, createPerson, GOOD_PASSWORD, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

const stateOf = (answer: request.Response) => ({
  status: answer.status,
  code: (answer.body as { code?: string }).code,
});

// What a sign-in must withstand: OWASP ASVS 5.0.0, chapters 6 and 7.
describe('signing in', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  beforeEach(() => testApp.dataSource.query('DELETE FROM attempt'));
  afterAll(() => testApp.close());

  it('keeps the session in a cookie that scripts can’t read, and in no body', async () => {
    const { email } = await createPerson(testApp.dataSource, ['technician']);
    const answer = await new Browser(testApp.server).signIn(email.toUpperCase());
    expect(answer.status).toBe(201);
    const [cookie = ''] = answer.get('Set-Cookie') ?? [];
    expect(cookie).toMatch(
      /^benchlark=ey[^;]+; Max-Age=\d+; Path=\/; Expires=[^;]+; HttpOnly; SameSite=Lax$/,
    );
    expect(answer.text).not.toContain(cookie.split(/[=;]/)[1]);
    expect(answer.body).toMatchObject({ person: { email, roles: ['technician'] } });
  });

  it('stores no token, only its hash', async () => {
    const { email, id } = await createPerson(testApp.dataSource, ['technician']);
    const answer = await new Browser(testApp.server).signIn(email);
    const [, payload = ''] = /^benchlark=[^.]+\.([^.]+)\./.exec(answer.get('Set-Cookie')?.[0] ?? '') ?? [];
    const { sid } = JSON.parse(Buffer.from(payload, 'base64url').toString()) as { sid: string };
    const rows = await testApp.dataSource.query('SELECT * FROM session WHERE person_id = $1', [id]);
    expect(Buffer.from(sid, 'base64url')).toHaveLength(32); // 256 bits
    expect(JSON.stringify(rows)).not.toContain(sid);
  });

  it('answers alike for a wrong password, an unknown address and a disabled account', async () => {
    const known = await createPerson(testApp.dataSource, ['reviewer']);
    const disabled = await createPerson(testApp.dataSource, ['reviewer'], { isDisabled: true });
    const answers = [
      await new Browser(testApp.server).signIn(known.email, 'not the password'),
      await new Browser(testApp.server).signIn('nobody@example.org', 'not the password'),
      await new Browser(testApp.server).signIn(disabled.email),
    ];
    const bodies = answers.map(({ body }) => ({ ...(body as object), requestId: '' }));
    expect(answers.map(stateOf)).toEqual(Array(3).fill({ status: 401, code: 'WRONG_CREDENTIALS' }));
    expect(bodies[1]).toEqual(bodies[0]);
    expect(bodies[2]).toEqual(bodies[0]);
  });

  it('compares the whole password', async () => {
    const password = `${'long '.repeat(15)}ending`;
    const passwordHash = await hash(password, {
      type: argon2id,
      memoryCost: 64,
      timeCost: 2,
      parallelism: 1,
    });
    const { email } = await createPerson(testApp.dataSource, ['reviewer'], { passwordHash });
    expect((await new Browser(testApp.server).signIn(email, password.slice(0, 72))).status).toBe(401);
    expect((await new Browser(testApp.server).signIn(email, password)).status).toBe(201);
  });

  it('refuses a password of a megabyte without hashing it', async () => {
    const { email } = await createPerson(testApp.dataSource, ['reviewer']);
    const answer = await new Browser(testApp.server).signIn(email, 'k'.repeat(1024 * 1024));
    expect(stateOf(answer)).toEqual({ status: 400, code: 'VALIDATION_FAILED' });
  });

  it('renews a hash that was made with weaker settings', async () => {
    const passwordHash = await hash(GOOD_PASSWORD, {
      type: argon2id,
      memoryCost: 32,
      timeCost: 2,
      parallelism: 1,
    });
    const { email, id } = await createPerson(testApp.dataSource, ['reviewer'], { passwordHash });
    await new Browser(testApp.server).signIn(email);
    const after = await testApp.dataSource.getRepository(Person).findOneByOrFail({ id });
    expect(after.passwordHash).toMatch(/^\$argon2id\$v=19\$m=64,t=2,p=1\$/);
  });

  it('blocks an account after five failures, tells how long, and lets others in from the same place', async () => {
    const [victim, other] = [
      await createPerson(testApp.dataSource, ['reviewer']),
      await createPerson(testApp.dataSource, ['reviewer']),
    ];
    const browser = new Browser(testApp.server);
    await browser.visit();
    const answers: request.Response[] = [];
    for (let attempt = 0; attempt < 32; attempt++) {
      answers.push(
        await browser.send(
          'post',
          '/api/session',
          { email: victim.email, password: 'not the password' },
          { 'X-Forwarded-For': `203.0.113.${attempt}` },
        ),
      );
    }
    expect(answers.map(({ status }) => status)).toEqual([
      ...Array<number>(5).fill(401),
      ...Array<number>(27).fill(429),
    ]);
    const retryAfterS = Number(answers[5]?.get('Retry-After'));
    expect(retryAfterS).toBeGreaterThan(20);
    expect(retryAfterS).toBeLessThanOrEqual(30);
    expect((await new Browser(testApp.server).signIn(victim.email)).status).toBe(429);
    expect((await new Browser(testApp.server).signIn(other.email)).status).toBe(201);
  });

  it('holds the limit against many at once, and doubles the wait', async () => {
    const { email } = await createPerson(testApp.dataSource, ['reviewer']);
    const browser = new Browser(testApp.server);
    await browser.visit();
    const fail = () => browser.send('post', '/api/session', { email, password: 'not the password' });
    const answers = await Promise.all(Array.from({ length: 20 }, fail));
    expect(answers.filter(({ status }) => status === 401)).toHaveLength(5);
    await testApp.dataSource.query(`UPDATE attempt SET blocked_until = now() WHERE key LIKE '%:account:%'`);
    expect((await fail()).status).toBe(401);
    const retryAfterS = Number((await fail()).get('Retry-After'));
    expect(retryAfterS).toBeGreaterThan(50); // 30 s, then 60 s
    expect(retryAfterS).toBeLessThanOrEqual(60);
  });

  it('remembers the limit after a restart', async () => {
    const { email } = await createPerson(testApp.dataSource, ['reviewer']);
    for (let attempt = 0; attempt < 5; attempt++)
      await new Browser(testApp.server).signIn(email, 'not the password');
    const second = await createTestApp({ database: testApp.database });
    try {
      expect((await new Browser(second.server).signIn(email)).status).toBe(429);
    } finally {
      await second.close();
    }
  });

  it('gives a new session at sign-in, whatever cookie came before', async () => {
    const { browser, email } = await signedIn(testApp, 'reviewer');
    const first = (await browser.visit()).body as { csrfToken: string };
    const again = await browser.signIn(email);
    expect((again.body as { csrfToken: string }).csrfToken).not.toBe(first.csrfToken);
  });
});

describe('the cookie behind https', () => {
  it('has the __Host- prefix and Secure, and every answer has HSTS', async () => {
    const testApp = await createTestApp({ env: { PUBLIC_URL: 'https://bench.example.org' } });
    try {
      const { email } = await createPerson(testApp.dataSource, ['reviewer']);
      const visit = await request(testApp.server).get('/api/session');
      const [visitor = ''] = visit.get('Set-Cookie') ?? [];
      const answer = await request(testApp.server)
        .post('/api/session')
        .set('Cookie', visitor.split(';')[0] ?? '')
        .set('x-csrf-token', (visit.body as { csrfToken: string }).csrfToken)
        .send({ email, password: GOOD_PASSWORD });
      expect(answer.get('Set-Cookie')?.[0]).toMatch(
        /^__Host-benchlark=[^;]+; .*Path=\/; .*HttpOnly; Secure; SameSite=Lax$/,
      );
      expect(answer.get('Set-Cookie')?.[0]).not.toContain('Domain');
      expect(answer.get('Strict-Transport-Security')).toBe('max-age=63072000; includeSubDomains');
    } finally {
      await testApp.close();
    }
  });
});
