import request from 'supertest';
import { createTestApp, type TestApp } from './support/test-app';

describe('requests of one address', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp({ env: { REQUESTS_PER_MINUTE: '5' } });
  });
  afterAll(() => testApp.close());

  it('are answered up to the limit, whatever the route, then refused with the time to wait', async () => {
    const routes = [
      '/api/health/live',
      '/api/session',
      '/api/health/live',
      '/api/session',
      '/api/health/live',
    ];
    for (const route of routes) await request(testApp.server).get(route).expect(200);
    const answer = await request(testApp.server)
      .get('/api/session')
      .set('X-Forwarded-For', '203.0.113.9') // no proxy is configured: this must not open a new account
      .expect(429);
    expect(answer.body).toMatchObject({ status: 429, code: 'TOO_MANY_REQUESTS' });
    expect(Number(answer.headers['retry-after'])).toBeGreaterThan(0);
    expect(Number(answer.headers['retry-after'])).toBeLessThanOrEqual(60);
  });
});
