import type { EntityManager } from 'typeorm';

/**
 * Serialises everything that is done with one object by any process until the transaction ends: storing it, and
 * sweeping it away.
 */
export async function lockObject(tx: EntityManager, sha256: string): Promise<void> {
  await tx.query(`SELECT pg_advisory_xact_lock(hashtextextended('stored-object:' || $1, 0))`, [sha256]);
}

/** Enters an object that has just been stored; one that was known and damaged is sound again. */
export async function enterObject(
  tx: EntityManager,
  object: { sha256: string; sizeBytes: number; kind: 'capture' | 'trace' },
): Promise<void> {
  await tx.query(
    `INSERT INTO stored_object (sha256, size_bytes, kind, checked_at) VALUES ($1, $2, $3, now())
     ON CONFLICT (sha256) DO UPDATE SET evidence = 'sound', checked_at = now()`,
    [object.sha256, object.sizeBytes, object.kind],
  );
}
