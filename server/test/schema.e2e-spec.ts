import { createDataSource } from '../src/database/data-source';
import { migrations } from '../src/database/migrations';
import { runMigrations } from '../src/database/run-migrations';
import { createTestDatabase, type TestDatabase } from './support/test-database';

describe('schema', () => {
  const databases: TestDatabase[] = [];
  const emptyDatabase = async () => {
    const database = await createTestDatabase({ isMigrated: false });
    databases.push(database);
    return database;
  };
  afterAll(() => Promise.all(databases.map((database) => database.drop())));

  it('is exactly what the entities describe', async () => {
    const { env } = await emptyDatabase();
    await runMigrations(env);
    const dataSource = await createDataSource(env).initialize();
    try {
      const drift = await dataSource.driver.createSchemaBuilder().log();
      expect(drift.upQueries.map(({ query }) => query)).toEqual([]);
    } finally {
      await dataSource.destroy();
    }
  });

  it('can be taken back to nothing and built again', async () => {
    const { env } = await emptyDatabase();
    await runMigrations(env);
    const dataSource = await createDataSource(env).initialize();
    try {
      for (let left = migrations.length; left > 0; left--) await dataSource.undoLastMigration();
      const tables = await dataSource.query<{ name: string }[]>(
        `SELECT table_name AS name FROM information_schema.tables WHERE table_schema = 'public'`,
      );
      expect(tables.map(({ name }) => name)).toEqual(['migration']);
    } finally {
      await dataSource.destroy();
    }
    expect(await runMigrations(env)).toHaveLength(migrations.length);
  });

  it('is built once when several servers start at the same moment', async () => {
    const { env } = await emptyDatabase();
    const done = await Promise.all([1, 2, 3].map(() => runMigrations(env)));
    expect(done.map((names) => names.length).sort()).toEqual([0, 0, migrations.length]);
  });

  it('is left alone when a newer version made it', async () => {
    const { env } = await emptyDatabase();
    await runMigrations(env);
    const dataSource = await createDataSource(env).initialize();
    await dataSource.query(
      `INSERT INTO migration (timestamp, name) VALUES (1999999999999, 'FromTomorrow1999999999999')`,
    );
    await dataSource.destroy();
    await expect(runMigrations(env)).rejects.toThrow('FromTomorrow1999999999999');
  });

  it('names every constraint and index by its kind', async () => {
    const { env } = await emptyDatabase();
    await runMigrations(env);
    const dataSource = await createDataSource(env).initialize();
    try {
      const names = await dataSource.query<{ name: string }[]>(`
        SELECT conname AS name FROM pg_constraint JOIN pg_class c ON c.oid = conrelid
          WHERE connamespace = 'public'::regnamespace AND c.relname <> 'migration' AND contype <> 'n'
        UNION SELECT indexname FROM pg_indexes WHERE schemaname = 'public' AND tablename <> 'migration'`);
      expect(names.map(({ name }) => name).filter((name) => !/^(pk|uq|ck|fk|ix)_/.test(name))).toEqual([]);
    } finally {
      await dataSource.destroy();
    }
  });
});
