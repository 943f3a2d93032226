import 'reflect-metadata';
import { readEnv } from '../config/env.schema';
import { runMigrations } from './run-migrations';

/** `node server/dist/database/migrate.js`: brings the database up to date and says what it did. */
async function main(): Promise<void> {
  const names = await runMigrations(readEnv());
  process.stdout.write(
    names.length === 0 ? 'The database is up to date.\n' : `Migrated: ${names.join(', ')}\n`,
  );
}

main().catch((error: unknown) => {
  process.stderr.write(`benchlark: ${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
});
