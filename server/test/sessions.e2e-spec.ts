import { createHmac } from 'node:crypto';
import request from 'supertest';
import { deriveKey } from '../src/auth/derive-key';
import { Browser, GOOD_PASSWORD, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

const encode = (value: object) => Buffer.from(JSON.stringify(value)).toString('base64url');

describe('sessions', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());

  const cookieOf = (answer: request.Response) => (answer.get('Set-Cookie')?.[0] ?? '').split(';')[0] ?? '';

  it('are over at once after signing out, also for a copy of the cookie', async () => {
    const { browser, email } = await signedIn(testApp, 'technician');
    const cookie = cookieOf(await browser.signIn(email));
    await request(testApp.server).get('/api/me').set('Cookie', cookie).expect(200);
    await browser.send('delete', '/api/session').expect(204);
    await request(testApp.server).get('/api/me').set('Cookie', cookie).expect(401);
  });

  it.each([
    ['disabled', { isDisabled: true }],
    ['given other roles', { roles: ['reader'] }],
  ])('of somebody who is %s end in every browser', async (_, change) => {
    const administrator = await signedIn(testApp, 'administrator');
    const { browser, email, id } = await signedIn(testApp, 'technician');
    const second = new Browser(testApp.server);
    await second.signIn(email);
    await administrator.browser.send('patch', `/api/people/${id}`, change).expect(200);
    await browser.send('get', '/api/me').expect(401);
    await second.send('get', '/api/me').expect(401);
  });

  it('of the other browsers end when the password changes; the old password opens nothing', async () => {
    const { browser, email } = await signedIn(testApp, 'technician');
    const second = new Browser(testApp.server);
    await second.signIn(email);
    const newPassword = 'copper roof at dusk';
    const wrong = await browser.send('post', '/api/me/password', { currentPassword: 'no', newPassword });
    expect(wrong.body).toMatchObject({
      code: 'VALIDATION_FAILED',
      fields: { currentPassword: expect.any(Array) },
    });
    const weak = await browser.send('post', '/api/me/password', {
      currentPassword: GOOD_PASSWORD,
      newPassword: 'password123',
    });
    expect(weak.body).toMatchObject({
      code: 'VALIDATION_FAILED',
      fields: { newPassword: expect.any(Array) },
    });
    await browser
      .send('post', '/api/me/password', { currentPassword: GOOD_PASSWORD, newPassword })
      .expect(204);
    await second.send('get', '/api/me').expect(401);
    expect((await new Browser(testApp.server).signIn(email)).status).toBe(401);
    expect((await new Browser(testApp.server).signIn(email, newPassword)).status).toBe(201);
  });

  it.each([
    ['after a day without use', `last_seen_at = now() - interval '24 hours 1 minute'`],
    ['after two weeks in any case', `expires_at = now() - interval '1 second'`],
  ])('end by themselves %s', async (_, shift) => {
    const { browser, id } = await signedIn(testApp, 'technician');
    await testApp.dataSource.query(`UPDATE session SET ${shift} WHERE person_id = $1`, [id]);
    await browser.send('get', '/api/me').expect(401);
    await signedIn(testApp, 'technician'); // whoever signs in next clears them away
    const rows = await testApp.dataSource.query('SELECT 1 FROM session WHERE person_id = $1', [id]);
    expect(rows).toHaveLength(0);
  });

  it('are listed and ended by their owner alone', async () => {
    const [mine, other] = [await signedIn(testApp, 'technician'), await signedIn(testApp, 'technician')];
    const second = new Browser(testApp.server);
    await second.signIn(mine.email);
    const { body } = await mine.browser.send('get', '/api/me/sessions').expect(200);
    const sessions = body as { id: string; isCurrent: boolean }[];
    expect(sessions.map(({ isCurrent }) => isCurrent).sort()).toEqual([false, true]);
    const elsewhere = sessions.find(({ isCurrent }) => !isCurrent)!;
    await other.browser.send('delete', `/api/me/sessions/${elsewhere.id}`).expect(404);
    await second.send('get', '/api/me').expect(200);
    await mine.browser.send('delete', `/api/me/sessions/${elsewhere.id}`).expect(204);
    await second.send('get', '/api/me').expect(401);
  });

  // RFC 8725: one algorithm, and issuer, audience and expiry are checked.
  it('are opened by no cookie that we did not write for that purpose', async () => {
    const { browser, email } = await signedIn(testApp, 'technician');
    const [name, value = ''] = cookieOf(await browser.signIn(email)).split('=');
    const [, payload = ''] = value.split('.');
    const claims = JSON.parse(Buffer.from(payload, 'base64url').toString()) as Record<string, unknown>;
    const key = deriveKey(testApp.env.SESSION_SECRET, 'session-cookie');
    const sign = (header: object, body: object, secret: Buffer | string = key) => {
      const signed = `${encode(header)}.${encode(body)}`;
      return `${signed}.${createHmac('sha256', secret).update(signed).digest('base64url')}`;
    };
    const header = { alg: 'HS256', typ: 'JWT' };
    const expectStatus = (cookie: string, status: number) =>
      request(testApp.server).get('/api/me').set('Cookie', `${name}=${cookie}`).expect(status);
    await expectStatus(sign(header, claims), 200); // the forger's tools are good ones
    await expectStatus(`${encode({ alg: 'none', typ: 'JWT' })}.${payload}.`, 401);
    await expectStatus(sign({ ...header, alg: 'HS512' }, claims), 401);
    await expectStatus(sign(header, claims, 'another secret'), 401);
    await expectStatus(sign(header, claims, deriveKey(testApp.env.SESSION_SECRET, 'csrf')), 401);
    await expectStatus(sign(header, { ...claims, aud: 'another' }), 401);
    await expectStatus(sign(header, { ...claims, iss: 'another' }), 401);
    await expectStatus(sign(header, { ...claims, exp: 1 }), 401);
    const immortal = { iss: claims.iss, aud: claims.aud, sid: claims.sid, iat: claims.iat };
    await expectStatus(sign(header, immortal), 401);
    await expectStatus(
      sign({ ...header, kid: '../../dev/null', jku: 'http://127.0.0.1:9/' }, claims, ''),
      401,
    );
  });

  it('are not needed by the command line, whose token opens no account page', async () => {
    const { browser, id } = await signedIn(testApp, 'technician');
    const { body } = await browser.send('post', '/api/me/tokens', { name: 'bench laptop' }).expect(201);
    const { token, id: tokenId } = body as { token: string; id: string };
    const call = (method: 'get' | 'post', path: string) =>
      request(testApp.server)[method](path).set('Authorization', `Bearer ${token}`);
    await call('get', '/api/units').expect(200);
    await call('post', '/api/units').send({ maker: 'Tarn & Weir', model: 'Two' }).expect(201);
    await call('get', '/api/me').expect(403);
    await call('post', '/api/me/tokens').send({ name: 'another' }).expect(403);
    const stored = await testApp.dataSource.query('SELECT * FROM api_token WHERE person_id = $1', [id]);
    expect(JSON.stringify(stored)).not.toContain(token.slice(4));
    await browser.send('delete', `/api/me/tokens/${tokenId}`).expect(204);
    await call('get', '/api/units').expect(401);
  });
});
