import { runMigrations } from 'graphile-worker';

/** Brings the queue's own tables up to date; they live in their own schema. */
export async function migrateQueue(databaseUrl: string): Promise<void> {
  await runMigrations({ connectionString: databaseUrl });
}
