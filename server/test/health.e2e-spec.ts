import request from 'supertest';
import { createTestApp, type TestApp } from './support/test-app';

describe('health', () => {
  let testApp: TestApp;
  beforeAll(async () => {
    testApp = await createTestApp();
  });
  afterAll(() => testApp.close());

  it('is live without looking at anything else', async () => {
    const answer = await request(testApp.server).get('/api/health/live').expect(200);
    expect(answer.body).toEqual({ status: 'ok' });
  });

  it('is ready when its components are up, each by its name', async () => {
    const answer = await request(testApp.server).get('/api/health/ready').expect(200);
    expect(answer.body).toMatchObject({ status: 'ready', components: { database: 'up' } });
  });
});
