import { readdir, stat } from 'node:fs/promises';
import { join } from 'node:path';
import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { EvidenceService } from './evidence.service';
import { ObjectStore } from './object-store';
import { removeFile } from './receive-file';
import { lockObject } from './stored-objects';

export const SWEEP_GRACE_MS = 24 * 3600_000;

export interface SweepReport {
  readonly removedTempFiles: number;
  /** Objects that nothing refers to, older than the grace time. */
  readonly orphans: readonly { sha256: string; sizeBytes: number }[];
  readonly removedOrphans: number;
}

/** Clears away what a crash left behind, and re-hashes what is stored. */
@Injectable()
export class SweepService {
  constructor(
    private readonly store: ObjectStore,
    private readonly dataSource: DataSource,
    private readonly evidence: EvidenceService,
  ) {}

  /**
   * @param options.removesOrphans - false (dry run): orphan objects are only reported
   * @param options.graceMs - younger files and objects may belong to an upload that is under way
   */
  async sweep(options: { removesOrphans: boolean; graceMs?: number }): Promise<SweepReport> {
    const before = Date.now() - (options.graceMs ?? SWEEP_GRACE_MS);
    const removedTempFiles = await this.sweepTempFiles(before);
    const orphans = await this.findOrphans(before);
    let removedOrphans = 0;
    if (options.removesOrphans) {
      for (const { sha256 } of orphans) if (await this.removeOrphan(sha256, before)) removedOrphans += 1;
    }
    return { removedTempFiles, orphans, removedOrphans };
  }

  /**
   * Forgets what has done its work: keys of uploads that nobody repeats any more, and counts of attempts that would begin
   * anew anyway.
   */
  async forgetOldRows(): Promise<void> {
    await this.dataSource.query(`DELETE FROM upload_key WHERE created_at < now() - interval '7 days'`);
    await this.dataSource.query(
      `DELETE FROM attempt WHERE updated_at < now() - interval '2 days' AND (blocked_until IS NULL OR blocked_until < now())`,
    );
  }

  /** Re-hashes every stored object, those longest unchecked first. */
  async checkAll(signal?: AbortSignal): Promise<{ sound: number; damaged: number; missing: number }> {
    const counts = { sound: 0, damaged: 0, missing: 0 };
    const objects: { sha256: string }[] = await this.dataSource.query(
      'SELECT sha256 FROM stored_object ORDER BY checked_at NULLS FIRST, sha256',
    );
    for (const { sha256 } of objects) {
      if (signal?.aborted) break;
      counts[await this.evidence.check(sha256)] += 1;
    }
    return counts;
  }

  private async sweepTempFiles(before: number): Promise<number> {
    let removed = 0;
    for (const name of await readdir(this.store.tempFolder)) {
      const path = join(this.store.tempFolder, name);
      if ((await stat(path)).mtimeMs >= before) continue;
      await removeFile(path);
      removed += 1;
    }
    return removed;
  }

  private async findOrphans(before: number): Promise<{ sha256: string; sizeBytes: number }[]> {
    const orphans: { sha256: string; sizeBytes: number }[] = [];
    for await (const { sha256, sizeBytes, storedAt } of this.store.list()) {
      if (storedAt.getTime() >= before) continue;
      if (!(await this.isKnown(this.dataSource, sha256))) orphans.push({ sha256, sizeBytes });
    }
    return orphans;
  }

  /** Looks again under the object's lock: an upload of the same bytes may have come in between. */
  private async removeOrphan(sha256: string, before: number): Promise<boolean> {
    return this.dataSource.transaction(async (tx) => {
      await lockObject(tx, sha256);
      const facts = await this.store.stat(sha256);
      if (!facts || facts.storedAt.getTime() >= before || (await this.isKnown(tx, sha256))) return false;
      await this.store.remove(sha256);
      return true;
    });
  }

  private async isKnown(source: { query: DataSource['query'] }, sha256: string): Promise<boolean> {
    const rows: unknown[] = await source.query('SELECT 1 FROM stored_object WHERE sha256 = $1', [sha256]);
    return rows.length > 0;
  }
}
