import { mkdir, mkdtemp, rm, writeFile } from 'node:fs/promises';
import { connect, createServer, type AddressInfo, type Socket } from 'node:net';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { ShutdownState } from '../src/common/shutdown-state';
import { Browser } from './support/browser';
import { createTestApp, type TestApp } from './support/test-app';
import { createTestDatabase } from './support/test-database';

describe('the frame of every answer', () => {
  let testApp: TestApp;
  let distDir: string;
  beforeAll(async () => {
    distDir = await mkdtemp(join(tmpdir(), 'benchlark-dist-'));
    await mkdir(join(distDir, 'assets'));
    await mkdir(join(distDir, '.git'));
    await writeFile(join(distDir, 'index.html'), '<!doctype html><title>Benchlark</title>');
    await writeFile(join(distDir, 'assets', 'index-k3j2.js'), 'export {};');
    await writeFile(join(distDir, 'assets', 'index-k3j2.js.map'), '{}');
    await writeFile(join(distDir, '.git', 'HEAD'), 'ref');
    testApp = await createTestApp({ env: { APP_DIST_DIR: distDir } });
  });
  afterAll(async () => {
    await testApp.close();
    await rm(distDir, { recursive: true });
  });

  // OWASP ASVS 5.0.0, 3.4.
  it.each(['/', '/captures/7', '/assets/index-k3j2.js', '/api/session', '/api/nope', '/nope.html'])(
    'carries the security headers: %s',
    async (path) => {
      const { headers } = await request(testApp.server).get(path).set('Origin', 'https://evil.test');
      const policy = String(headers['content-security-policy']).split(';');
      for (const directive of [
        "default-src 'self'",
        "script-src 'self'",
        "object-src 'none'",
        "base-uri 'none'",
        "frame-ancestors 'none'",
      ]) {
        expect(policy).toContain(directive);
      }
      expect(headers).toMatchObject({
        'x-content-type-options': 'nosniff',
        'referrer-policy': 'no-referrer',
        'cross-origin-opener-policy': 'same-origin',
        'cross-origin-embedder-policy': 'require-corp',
        'cross-origin-resource-policy': 'same-origin',
        'x-request-id': expect.stringMatching(/^[0-9a-f-]{36}$/),
      });
      expect(headers).not.toHaveProperty('access-control-allow-origin');
      expect(headers).not.toHaveProperty('x-powered-by');
    },
  );

  it.each(['/', '/captures/7', '/sign-in'])('is the app’s page for %s', async (path) => {
    const answer = await request(testApp.server).get(path).expect(200);
    expect(answer.text).toContain('<title>Benchlark</title>');
    expect(answer.get('Cache-Control')).toBe('no-cache');
  });

  it('lets built files be kept for a year', async () => {
    const answer = await request(testApp.server).get('/assets/index-k3j2.js').expect(200);
    expect(answer.get('Cache-Control')).toBe('public, max-age=31536000, immutable');
  });

  it.each([
    '/api',
    '/api/nope',
    '/api/me.css',
    '/.git/HEAD',
    '/package.json',
    '/assets/',
    '/assets/nope.js',
    '/assets/index-k3j2.js.map',
    '/assets/..%2f..%2fpackage.json',
    '/metrics.txt',
  ])('is a 404 problem, not the page, for %s', async (path) => {
    const answer = await request(testApp.server).get(path).expect(404);
    expect(answer.type).toBe('application/problem+json');
    expect(answer.body).toMatchObject({ type: 'about:blank', status: 404, code: 'NOT_FOUND' });
    expect(answer.get('Cache-Control')).toBe('no-store');
  });

  it('refuses a body that is too large, compressed or no JSON', async () => {
    const browser = new Browser(testApp.server);
    await browser.visit();
    const large = await browser.send('post', '/api/session', {
      email: 'k'.repeat(3 * 1024 * 1024),
      password: '',
    });
    expect(large.body).toMatchObject({ status: 413, code: 'BODY_TOO_LARGE' });
    const packed = await browser.send('post', '/api/session', {}, { 'Content-Encoding': 'gzip' });
    expect(packed.status).toBe(415);
  });

  it('is 503 for everything but health once the process ends', async () => {
    const ending = await createTestApp();
    try {
      ending.app.get(ShutdownState).begin();
      const answer = await request(ending.server).get('/api/session').expect(503);
      expect(answer.get('Retry-After')).toBe('5');
      await request(ending.server).get('/api/health/live').expect(200);
      expect((await request(ending.server).get('/api/health/ready').expect(503)).body).toMatchObject({
        status: 'shutting-down',
      });
    } finally {
      await ending.close();
    }
  });
});

describe('without a database', () => {
  it('is 503 with a request id, lets nobody in, says what is down, and recovers by itself', async () => {
    const database = await createTestDatabase();
    const target = new URL(database.url);
    const sockets = new Set<Socket>();
    const proxy = createServer((client) => {
      const server = connect(Number(target.port), target.hostname);
      for (const socket of [client, server]) {
        sockets.add(socket);
        socket.on('error', () => socket.destroy()).on('close', () => sockets.delete(socket));
      }
      client.pipe(server).pipe(client);
    });
    const listen = (port: number) => new Promise<void>((resolve) => proxy.listen(port, '127.0.0.1', resolve));
    await listen(0);
    const { port } = proxy.address() as AddressInfo;
    const proxied = new URL(database.url);
    proxied.host = `127.0.0.1:${port}`;
    const testApp = await createTestApp({ database, env: { DATABASE_URL: proxied.toString() } });
    try {
      const cookie = 'benchlark=none';
      await request(testApp.server).get('/api/session').expect(200);
      proxy.close();
      for (const socket of sockets) socket.destroy();

      const answer = await request(testApp.server).get('/api/session').expect(503);
      expect(answer.body).toMatchObject({ code: 'UNAVAILABLE', requestId: answer.get('X-Request-Id') });
      expect(answer.text).not.toMatch(/ECONN|postgres|127\.0\.0\.1|stack/i);
      expect(Number(answer.get('Retry-After'))).toBeGreaterThan(0);
      const guarded = await request(testApp.server)
        .get('/api/people')
        .set('Authorization', 'Bearer blk_x')
        .set('Cookie', cookie);
      expect(guarded.status).toBe(503);
      await request(testApp.server).get('/api/health/live').expect(200);
      const ready = await request(testApp.server).get('/api/health/ready').expect(503);
      expect(ready.body).toMatchObject({ status: 'not-ready', components: { database: 'down' } });

      await listen(port);
      await request(testApp.server).get('/api/session').expect(200);
      await request(testApp.server).get('/api/health/ready').expect(200);
    } finally {
      await testApp.close();
      proxy.close();
      await database.drop();
    }
  });
});
