import { LocalMailServer } from '../src/mail/local-mail-server';
import { MailDispatcher } from '../src/mail/mail-dispatcher';
import { Browser, createPerson, GOOD_PASSWORD, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

describe('joining a bench', () => {
  let testApp: TestApp;
  let administrator: Browser;
  beforeAll(async () => {
    testApp = await createTestApp();
    administrator = (await signedIn(testApp, 'administrator')).browser;
  });
  beforeEach(() => testApp.dataSource.query('DELETE FROM attempt'));
  afterAll(() => testApp.close());

  const visitor = async () => {
    const browser = new Browser(testApp.server);
    await browser.visit();
    return browser;
  };
  const tokenOf = (text: string) => /#([\w-]+)/.exec(text)?.[1] ?? '';
  const invite = async (wish: object) => {
    const { body } = await administrator.send('post', '/api/invitations', wish).expect(201);
    const made = body as { id: string; link: string; isMailed: boolean };
    return { ...made, token: tokenOf(made.link) };
  };
  const mailsTo = async (address: string) => {
    await testApp.app.get(MailDispatcher, { strict: false }).dispatch();
    return testApp.app.get(LocalMailServer, { strict: false }).mails.filter(({ to }) => to === address);
  };

  describe('by invitation', () => {
    it('works once, for one of twenty who come at the same moment', async () => {
      const { token } = await invite({ roles: ['technician', 'reviewer'] });
      const browsers = await Promise.all(Array.from({ length: 20 }, visitor));
      const answers = await Promise.all(
        browsers.map((browser, index) =>
          browser.send('post', '/api/invitations/accept', {
            token,
            displayName: `Guest ${index}`,
            email: `guest-${index}@example.org`,
            password: GOOD_PASSWORD,
          }),
        ),
      );
      const won = answers.filter(({ status }) => status === 201);
      expect(won).toHaveLength(1);
      expect(won[0]?.body).toMatchObject({ person: { roles: ['reviewer', 'technician'] } });
      expect(new Set(answers.filter(({ status }) => status !== 201).map(({ status }) => status))).toEqual(
        new Set([410]),
      );
      const made = await testApp.dataSource.query(`SELECT 1 FROM person WHERE email LIKE 'guest-%'`);
      expect(made).toHaveLength(1);
    });

    it('comes by mail, from our own address whatever the Host header says, and is stored only as a hash', async () => {
      const { body } = await administrator
        .send(
          'post',
          '/api/invitations',
          { email: 'Robin@Example.org', roles: ['peer'] },
          { Host: 'evil.test' },
        )
        .expect(201);
      const { link, isMailed } = body as { link: string; isMailed: boolean };
      expect(isMailed).toBe(true);
      expect(link).toMatch(/^http:\/\/127\.0\.0\.1:4870\/invitation#[\w-]{43}$/);
      const [mail] = await mailsTo('robin@example.org');
      expect(mail?.text).toContain(link);
      const tables = await testApp.dataSource.query(
        `SELECT (SELECT json_agg(i) FROM invitation i)::text AS a, (SELECT json_agg(m) FROM mail_message m)::text AS b,
                (SELECT json_agg(e) FROM audit_entry e)::text AS c`,
      );
      expect(JSON.stringify(tables)).not.toContain(tokenOf(link));

      const browser = await visitor();
      const look = await browser.send('post', '/api/invitations/look', { token: tokenOf(link) }).expect(200);
      expect(look.body).toMatchObject({
        email: 'robin@example.org',
        roles: ['peer'],
        invitedBy: 'Wren Calloway',
      });
      const acceptance = { token: tokenOf(link), displayName: 'Robin', password: GOOD_PASSWORD };
      const other = await browser.send('post', '/api/invitations/accept', {
        ...acceptance,
        email: 'x@example.org',
      });
      expect(other.body).toMatchObject({ code: 'VALIDATION_FAILED', fields: { email: expect.any(Array) } });
      await browser.send('post', '/api/invitations/accept', acceptance).expect(201);
    });

    it.each([
      ['revoked', `revoked_at = now()`],
      ['run out', `expires_at = now()`],
    ])('is refused once it is %s', async (_, change) => {
      const { token, id } = await invite({ roles: ['reader'] });
      await testApp.dataSource.query(`UPDATE invitation SET ${change} WHERE id = $1`, [id]);
      const answer = await (await visitor()).send('post', '/api/invitations/look', { token });
      expect(answer.body).toMatchObject({ status: 410, code: 'TOKEN_SPENT' });
    });

    it('is not spent by a bad password or an address that is taken', async () => {
      const { token } = await invite({ roles: ['reader'] });
      const taken = await createPerson(testApp.dataSource, ['reader']);
      const browser = await visitor();
      const accept = (wish: object) =>
        browser.send('post', '/api/invitations/accept', { token, displayName: 'Isla Marr', ...wish });
      const weak = await accept({ email: 'isla@example.org', password: 'islamarr1' });
      expect(weak.body).toMatchObject({ code: 'VALIDATION_FAILED', fields: { password: expect.any(Array) } });
      expect((await accept({ email: taken.email, password: GOOD_PASSWORD })).body).toMatchObject({
        code: 'EMAIL_TAKEN',
      });
      await accept({ email: 'isla@example.org', password: GOOD_PASSWORD }).expect(201);
    });

    it.each([
      ['an address with a header behind it', { email: 'a@b.example\r\nBcc: x@y.example' }],
      ['two addresses', { email: 'a@b.example, x@y.example' }],
      ['a role that there is not', { roles: ['owner'] }],
      ['no role', { roles: [] }],
      ['an unknown field', { invitedById: 'me' }],
    ])('is not sent for %s', async (_, change) => {
      const answer = await administrator.send('post', '/api/invitations', {
        email: 'fine@example.org',
        roles: ['reader'],
        ...change,
      });
      expect(answer.body).toMatchObject({ status: 400, code: 'VALIDATION_FAILED' });
      expect(Object.keys((answer.body as { fields: object }).fields)).toEqual(Object.keys(change));
    });
  });

  describe('a forgotten password', () => {
    const ask = async (email: string) => (await visitor()).send('post', '/api/password-resets', { email });

    it('is asked for with the same answer for known and unknown addresses, in the same time', async () => {
      const { email } = await createPerson(testApp.dataSource, ['reviewer']);
      const timesMs: number[] = [];
      for (const address of [email, 'nobody-here@example.org']) {
        const startedAt = performance.now();
        const answer = await ask(address);
        timesMs.push(performance.now() - startedAt);
        expect({ status: answer.status, text: answer.text }).toEqual({ status: 202, text: '' });
      }
      // Both wait for the same clock; what remains is the noise of a busy machine.
      expect(Math.min(...timesMs)).toBeGreaterThan(149);
      expect(await mailsTo(email)).toHaveLength(1);
      expect(await mailsTo('nobody-here@example.org')).toHaveLength(0);
    });

    it('sends a mailbox five links at most, and never says so', async () => {
      const { email } = await createPerson(testApp.dataSource, ['reviewer']);
      for (let time = 0; time < 7; time++) expect((await ask(email)).status).toBe(202);
      expect(await mailsTo(email)).toHaveLength(5);
    });

    it('is replaced once, by one of twenty at the same moment; every way in by the old one ends', async () => {
      const { browser, email } = await signedIn(testApp, 'reviewer');
      await browser.send('post', '/api/me/tokens', { name: 'bench laptop' }).expect(201);
      await ask(email);
      await ask(email);
      const [token = '', older = ''] = (await mailsTo(email)).map(({ text }) => tokenOf(text));
      const weak = await (
        await visitor()
      ).send('post', '/api/password-resets/complete', { token, password: 'benchlark2026' });
      expect(weak.body).toMatchObject({ code: 'VALIDATION_FAILED', fields: { password: expect.any(Array) } });
      const browsers = await Promise.all(Array.from({ length: 20 }, visitor));
      const password = 'copper roof at dusk';
      const answers = await Promise.all(
        browsers.map((one) => one.send('post', '/api/password-resets/complete', { token, password })),
      );
      expect(answers.map(({ status }) => status).sort()).toEqual([204, ...Array<number>(19).fill(410)]);
      const late = await (
        await visitor()
      ).send('post', '/api/password-resets/complete', { token: older, password });
      expect(late.status).toBe(410);
      await browser.send('get', '/api/me').expect(401);
      const tokens = await testApp.dataSource.query(
        'SELECT 1 FROM api_token t JOIN person p ON p.id = t.person_id WHERE p.email = $1',
        [email],
      );
      expect(tokens).toHaveLength(0);
      expect((await new Browser(testApp.server).signIn(email)).status).toBe(401);
      expect((await new Browser(testApp.server).signIn(email, password)).status).toBe(201);
    });

    it('can’t be replaced after the hour, nor with a token of another kind', async () => {
      const { email } = await createPerson(testApp.dataSource, ['reviewer']);
      await ask(email);
      const [mail] = await mailsTo(email);
      await testApp.dataSource.query('UPDATE password_reset SET expires_at = now()');
      const { token: invitation } = await invite({ roles: ['reader'] });
      for (const token of [tokenOf(mail?.text ?? ''), invitation]) {
        const browser = await visitor();
        await browser
          .send('post', '/api/password-resets/complete', { token, password: GOOD_PASSWORD })
          .expect(410);
      }
    });
  });
});
