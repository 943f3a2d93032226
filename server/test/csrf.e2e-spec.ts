import request from 'supertest';
import { Browser, GOOD_PASSWORD, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

// The cases of OWASP ASVS 5.0.0, 3.5.1 to 3.5.3, and of OWASP's cheat sheet on cross-site request forgery.
describe('requests that another site makes a browser send', () => {
  let testApp: TestApp;
  let browser: Browser;
  let id: string;
  beforeAll(async () => {
    testApp = await createTestApp();
    ({ browser, id } = await signedIn(testApp, 'technician'));
  });
  afterAll(() => testApp.close());

  const rename = (headers: Record<string, string>) =>
    browser.send('patch', '/api/me', { displayName: 'Somebody Else' }, headers);
  const expectRefused = async (sent: request.Test) => {
    const answer = await sent;
    expect({ status: answer.status, code: (answer.body as { code?: string }).code }).toEqual({
      status: 403,
      code: 'CSRF_REFUSED',
    });
    const [person] = await testApp.dataSource.query<{ display_name: string }[]>(
      'SELECT display_name FROM person WHERE id = $1',
      [id],
    );
    expect(person?.display_name).toBe('Wren Calloway');
  };

  it.each([
    ['a foreign Origin', { Origin: 'https://evil.test' }],
    ['an Origin of null', { Origin: 'null' }],
    ['our host on another port', { Origin: 'http://127.0.0.1:4999' }],
    ['Sec-Fetch-Site: cross-site', { 'Sec-Fetch-Site': 'cross-site' }],
    ['Sec-Fetch-Site: same-site', { 'Sec-Fetch-Site': 'same-site' }],
    ['an empty token', { 'x-csrf-token': '' }],
    ['a wrong token', { 'x-csrf-token': 'k'.repeat(43) }],
  ])('are refused for %s', async (_, headers) => {
    await expectRefused(rename(headers));
  });

  it('are refused without a token', async () => {
    await expectRefused(browser.agent.patch('/api/me').send({ displayName: 'Somebody Else' }));
  });

  it('are refused with a token of somebody else’s session', async () => {
    const other = await signedIn(testApp, 'technician');
    await expectRefused(rename({ 'x-csrf-token': other.browser.csrfToken }));
  });

  it('are refused with a token from before signing in', async () => {
    const visitor = new Browser(testApp.server);
    await visitor.visit();
    await expectRefused(rename({ 'x-csrf-token': visitor.csrfToken }));
  });

  it.each(['text/plain', 'application/x-www-form-urlencoded'])('are refused as a form’s %s', async (type) => {
    const body = JSON.stringify({ displayName: 'Somebody Else' });
    await expectRefused(
      browser.agent
        .patch('/api/me')
        .set({ 'x-csrf-token': browser.csrfToken, 'Content-Type': type })
        .send(body),
    );
  });

  it('are refused as an upload from another origin', async () => {
    const form = browser.agent.post('/api/captures').set('Origin', 'https://evil.test');
    await expectRefused(form.attach('file', Buffer.from('RIFF'), 'take.wav'));
  });

  it('can’t sign a visitor in to somebody else’s account', async () => {
    const answer = await request(testApp.server)
      .post('/api/session')
      .send({ email: 'a@example.org', password: GOOD_PASSWORD });
    expect(answer.body).toMatchObject({ status: 403, code: 'CSRF_REFUSED' });
  });

  it('are told from our own page, under any name of this machine', async () => {
    for (const origin of ['http://127.0.0.1:4870', 'http://localhost:4870', 'http://[::1]:4870']) {
      const headers = { Origin: origin, 'Sec-Fetch-Site': 'same-origin' };
      await browser.send('patch', '/api/me', { displayName: 'Wren Calloway' }, headers).expect(200);
    }
  });

  it('leave a line in the audit trail', async () => {
    await rename({ Origin: 'https://evil.test' });
    const rows = await testApp.dataSource.query(
      `SELECT 1 FROM audit_entry WHERE action = 'access.forgery-refused' AND actor_id = $1 AND detail = 'PATCH /api/me'`,
      [id],
    );
    expect(rows.length).toBeGreaterThan(0);
  });
});
