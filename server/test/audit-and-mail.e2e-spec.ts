import { createServer, type AddressInfo, type Server } from 'node:net';
import { MailDispatcher } from '../src/mail/mail-dispatcher';
import { MailService } from '../src/mail/mail.service';
import { Browser, signedIn } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';

describe('the audit trail', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());

  it.each([`UPDATE audit_entry SET action = 'nothing'`, 'DELETE FROM audit_entry', 'TRUNCATE audit_entry'])(
    'can’t be changed: %s',
    async (sql) => {
      await signedIn(testApp, 'reader');
      await expect(testApp.dataSource.query(sql)).rejects.toMatchObject({ driverError: { code: '42501' } });
    },
  );

  it('tells who, what, from where and in which request, by the database’s clock', async () => {
    const { browser, id } = await signedIn(testApp, 'reviewer');
    const answer = await browser
      .send('get', '/api/people', undefined, { 'X-Forwarded-For': '203.0.113.9' })
      .expect(403);
    const [entry] = await testApp.dataSource.query<Record<string, unknown>[]>(
      `SELECT *, at BETWEEN now() - interval '1 minute' AND now() AS is_recent FROM audit_entry
        WHERE request_id = $1`,
      [answer.get('X-Request-Id')],
    );
    expect(entry).toMatchObject({
      actor_id: id,
      actor_name: 'Wren Calloway',
      action: 'access.denied',
      detail: 'GET /api/people',
      ip: '127.0.0.1',
      is_recent: true,
    });
  });

  it('is read page by page, newest first, and searched', async () => {
    const { browser } = await signedIn(testApp, 'administrator');
    for (let time = 0; time < 3; time++)
      await new Browser(testApp.server).signIn('nobody@example.org', `wrong ${time}`);
    const ids: number[] = [];
    let cursor: string | null = '';
    do {
      const path: string = `/api/audit?limit=2&q=session.refused${cursor === '' ? '' : `&cursor=${cursor}`}`;
      const { body } = await browser.send('get', path).expect(200);
      const page = body as { items: { id: string; action: string }[]; nextCursor: string | null };
      expect(new Set(page.items.map(({ action }) => action))).toEqual(new Set(['session.refused']));
      ids.push(...page.items.map(({ id }) => Number(id)));
      cursor = page.nextCursor;
    } while (cursor !== null);
    expect(ids.length).toBeGreaterThanOrEqual(3);
    expect(ids).toEqual([...new Set(ids)].sort((a, b) => b - a));
  });

  it.each(['limit=0', 'limit=-1', 'limit=2147483648', 'limit=x', 'cursor=x', 'page=1', 'q=a&q=b'])(
    'refuses %s',
    async (query) => {
      const { browser } = await signedIn(testApp, 'administrator');
      expect((await browser.send('get', `/api/audit?${query}`)).body).toMatchObject({
        code: 'VALIDATION_FAILED',
      });
    },
  );

  it('keeps no password', async () => {
    await new Browser(testApp.server).signIn('nobody@example.org', 'S3cret\nlevel=info');
    const rows = await testApp.dataSource.query('SELECT * FROM audit_entry');
    expect(JSON.stringify(rows)).not.toContain('S3cret');
  });
});

describe('mails', () => {
  const mail = { to: 'robin@example.org', subject: 'A subject', text: 'A secret link' };
  const stateOf = (testApp: TestApp) =>
    testApp.dataSource.query(
      `SELECT state, attempts, last_error IS NOT NULL AS has_error, sealed_text IS NULL AS is_erased FROM mail_message`,
    );

  it('wait for a server that is down, are tried again later, and are erased once sent', async () => {
    const testApp = await createTestApp({ env: { SMTP_URL: 'smtp://127.0.0.1:9' } });
    try {
      const dispatcher = testApp.app.get(MailDispatcher, { strict: false });
      await testApp.app.get(MailService, { strict: false }).queue(mail);
      await dispatcher.dispatch();
      await dispatcher.dispatch(); // not due yet
      expect(await stateOf(testApp)).toEqual([
        { state: 'queued', attempts: 1, has_error: true, is_erased: false },
      ]);
      await testApp.dataSource.query('UPDATE mail_message SET attempts = 7, due_at = now()');
      await dispatcher.dispatch();
      expect(await stateOf(testApp)).toEqual([
        { state: 'failed', attempts: 8, has_error: true, is_erased: true },
      ]);
      const told = await testApp.dataSource.query(`SELECT 1 FROM audit_entry WHERE action = 'mail.failed'`);
      expect(told).toHaveLength(1);
    } finally {
      await testApp.close();
    }
  });

  it('are sent once by several servers, as one plain mail, and shown to the administrator', async () => {
    const testApp = await createTestApp();
    const second = await createTestApp({ database: testApp.database });
    try {
      const service = testApp.app.get(MailService, { strict: false });
      await service.queue(mail);
      const apps = [testApp, second];
      await Promise.all(apps.map(({ app }) => app.get(MailDispatcher, { strict: false }).dispatch()));
      expect(await stateOf(testApp)).toEqual([
        { state: 'sent', attempts: 1, has_error: false, is_erased: true },
      ]);
      const pages = await Promise.all(
        apps.map(async (one) => {
          const { browser } = await signedIn(one, 'administrator');
          return ((await browser.send('get', '/api/mail').expect(200)).body as { items: object[] }).items;
        }),
      );
      expect(pages.flat()).toEqual([expect.objectContaining(mail)]);
      for (const change of [
        { to: 'a@b.example\r\nBcc: x@y.example' },
        { to: 'a@b.example,c@d.example' },
        { subject: 'A\nB' },
      ]) {
        await expect(service.queue({ ...mail, ...change })).rejects.toMatchObject({
          code: 'VALIDATION_FAILED',
        });
      }
    } finally {
      await second.close();
      await testApp.close();
    }
  });

  it('are not shown where they are really sent', async () => {
    const testApp = await createTestApp({ env: { SMTP_URL: 'smtp://127.0.0.1:9' } });
    try {
      const { browser } = await signedIn(testApp, 'administrator');
      await browser.send('get', '/api/mail').expect(404);
      expect((await browser.visit()).body).toMatchObject({ hasMailPage: false });
    } finally {
      await testApp.close();
    }
  });

  it('are not handed to a server that hangs', async () => {
    const silent: Server = createServer(() => undefined);
    await new Promise<void>((resolve) => silent.listen(0, '127.0.0.1', resolve));
    const testApp = await createTestApp({
      env: { SMTP_URL: `smtp://127.0.0.1:${(silent.address() as AddressInfo).port}` },
    });
    try {
      const { browser } = await signedIn(testApp, 'administrator');
      const startedAt = performance.now();
      await browser
        .send('post', '/api/invitations', { email: 'robin@example.org', roles: ['reader'] })
        .expect(201);
      expect(performance.now() - startedAt).toBeLessThan(2_000); // the mail waits in the outbox, nobody else does
    } finally {
      await testApp.close();
      silent.close();
    }
  });
});
