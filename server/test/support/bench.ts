import { mkdtemp, readdir, rm } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import request from 'supertest';
import { ApiTokensService } from '../../src/auth/api-tokens/api-tokens.service';
import type { CaptureDto } from '../../src/captures/dto/capture.dto';
import type { Role } from '../../src/common/roles';
import { createTestApp, type TestApp, type TestAppOptions } from './test-app';

export interface Bench extends TestApp {
  readonly storeDir: string;
  readonly personId: string;
  /** Authorization header of a person with the role. */
  as(role: Role): { Authorization: string };
  /** A request as the technician. */
  get(path: string): request.Test;
  post(path: string): request.Test;
  patch(path: string): request.Test;
  delete(path: string): request.Test;
  upload(
    bytes: Buffer,
    options?: { name?: string; fields?: Record<string, string>; key?: string },
  ): request.Test;
  uploaded(bytes: Buffer, options?: { name?: string; fields?: Record<string, string> }): Promise<CaptureDto>;
  /** Names of files that are still arriving. */
  tempFiles(): Promise<string[]>;
}

const ROLES: readonly Role[] = ['technician', 'reviewer', 'peer', 'administrator', 'reader'];

/** An application with a store of its own and one person of each role. */
export async function createBench(options: TestAppOptions = {}): Promise<Bench> {
  const storeDir = await mkdtemp(join(tmpdir(), 'benchlark-test-'));
  const testApp = await createTestApp({
    ...options,
    env: { STORE_DIR: storeDir, ...options.env },
  });
  const { app, server, dataSource } = testApp;
  const tokens = new Map<Role, string>();
  let personId = '';
  for (const role of ROLES) {
    const [person] = await dataSource.query<{ id: string }[]>(
      `INSERT INTO person (display_name, email, password_hash) VALUES ($1, $2, 'none') RETURNING id`,
      [`Test ${role}`, `${role}-${Date.now()}@bench.example`],
    );
    await dataSource.query('INSERT INTO person_role (person_id, role) VALUES ($1, $2)', [person!.id, role]);
    tokens.set(role, (await app.get(ApiTokensService, { strict: false }).create(person!.id, 'test')).token);
    if (role === 'technician') personId = person!.id;
  }
  const as = (role: Role) => ({ Authorization: `Bearer ${tokens.get(role)}` });
  const technician = as('technician');
  const upload: Bench['upload'] = (bytes, { name = 'take.wav', fields = {}, key } = {}) => {
    const form = request(server).post('/api/captures').set(technician);
    if (key !== undefined) void form.set('Idempotency-Key', key);
    for (const [field, value] of Object.entries(fields)) void form.field(field, value);
    return form.attach('file', bytes, name);
  };
  return {
    ...testApp,
    storeDir,
    personId,
    as,
    get: (path) => request(server).get(path).set(technician),
    post: (path) => request(server).post(path).set(technician),
    patch: (path) => request(server).patch(path).set(technician),
    delete: (path) => request(server).delete(path).set(technician),
    upload,
    uploaded: async (bytes, given) => (await upload(bytes, given).expect(201)).body as CaptureDto,
    tempFiles: () => readdir(join(storeDir, 'incoming')),
    close: async () => {
      await testApp.close();
      await rm(storeDir, { recursive: true, force: true });
    },
  };
}
