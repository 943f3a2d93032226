import { randomBytes } from 'node:crypto';
import { Client } from 'pg';
import type { Env } from '../../src/config/env.schema';
import { parseEnv } from '../../src/config/env.schema';
import { runMigrations } from '../../src/database/run-migrations';

export interface TestDatabase {
  readonly url: string;
  readonly name: string;
  /** Configuration of a test server on this database: cheap hashes, no logging. */
  readonly env: Env;
  drop(): Promise<void>;
}

function adminUrl(): string {
  const url = process.env['TEST_DATABASE_URL'];
  if (!url) throw new Error('TEST_DATABASE_URL must name a PostgreSQL server on which databases may be made');
  return url;
}

async function asAdmin(sql: string): Promise<void> {
  const client = new Client({ connectionString: adminUrl() });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}

/** The configuration every test starts from; argon2 is kept cheap because its cost is not what is tested. */
export function testEnv(databaseUrl: string, overrides: Record<string, string> = {}): Env {
  return parseEnv({
    NODE_ENV: 'test',
    PUBLIC_URL: 'http://127.0.0.1:4870',
    DATABASE_URL: databaseUrl,
    DATABASE_POOL_SIZE: '6',
    SESSION_SECRET: 'a-secret-that-only-the-tests-know-0123456789',
    LOG_LEVEL: 'silent',
    ARGON2_MEMORY_KIB: '64',
    ARGON2_TIME_COST: '2',
    ARGON2_PARALLELISM: '1',
    ...overrides,
  });
}

/**
 * Makes a database of its own for one test file.
 *
 * @param options.isMigrated - false leaves it empty
 */
export async function createTestDatabase({ isMigrated = true } = {}): Promise<TestDatabase> {
  const name = `benchlark_test_${randomBytes(6).toString('hex')}`;
  await asAdmin(`CREATE DATABASE ${name}`);
  const url = new URL(adminUrl());
  url.pathname = `/${name}`;
  const env = testEnv(url.toString());
  if (isMigrated) await runMigrations(env);
  return {
    url: url.toString(),
    name,
    env,
    drop: () => asAdmin(`DROP DATABASE IF EXISTS ${name} WITH (FORCE)`),
  };
}
