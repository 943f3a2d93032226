import { migrateQueue } from '../jobs/migrate-queue';
import { createDataSource, type DatabaseEnv } from './data-source';
import { migrations } from './migrations';

/** Any fixed number will do, as long as every server asks for the same lock. */
const MIGRATION_LOCK = 1_764_570_000;
/** A migration may rewrite a large table; the limit only ends one that hangs for good. */
const MIGRATION_TIMEOUT_MS = 15 * 60_000;

/**
 * Brings the schema up to date, in one transaction.
 *
 * Servers that start at the same moment wait for one another; the later ones find nothing left to do.
 * @returns names of the migrations that were run
 * @throws when the database holds a migration that this version does not know
 */
export async function runMigrations(env: DatabaseEnv): Promise<string[]> {
  const dataSource = createDataSource({
    ...env,
    DATABASE_QUERY_TIMEOUT_MS: MIGRATION_TIMEOUT_MS,
    DATABASE_POOL_SIZE: 2,
  });
  await dataSource.initialize();
  const lock = dataSource.createQueryRunner();
  try {
    await lock.query('SELECT pg_advisory_lock($1)', [MIGRATION_LOCK]);
    const done = await dataSource.runMigrations();
    await migrateQueue(env.DATABASE_URL);
    const stored = (await lock.query('SELECT name FROM migration ORDER BY id')) as { name: string }[];
    const known = new Set(migrations.map((migration) => migration.name));
    const unknown = stored.find(({ name }) => !known.has(name));
    if (unknown) {
      throw new Error(`the database was made by a newer version of the server (it holds ${unknown.name})`);
    }
    return done.map(({ name }) => name);
  } finally {
    await lock.release();
    await dataSource.destroy(); // ends the connection and with it the lock
  }
}
