import { createHash } from 'node:crypto';
import { Injectable, Logger } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AppError } from '../common/app-error';
import { ObjectMissingError, ObjectStore } from './object-store';
import type { Evidence } from './stored-object.entity';

/** How long a check holds while size and time of the stored bytes stay as they were. */
const CHECK_HOLDS_MS = 10 * 60_000;
const REMEMBERED_MAX = 500;

/** Whether stored bytes still are what their hash says. */
@Injectable()
export class EvidenceService {
  readonly #logger = new Logger('Evidence');
  readonly #checked = new Map<string, { stamp: string; atMs: number }>();

  constructor(
    private readonly store: ObjectStore,
    private readonly dataSource: DataSource,
  ) {}

  /** Hashes the stored bytes and notes the outcome on the object's row. */
  async check(sha256: string): Promise<Evidence> {
    const facts = await this.store.stat(sha256);
    const evidence = facts === null ? 'missing' : await this.compare(sha256);
    if (evidence === 'sound' && facts) this.remember(sha256, stampOf(facts));
    else this.#checked.delete(sha256);
    await this.note(sha256, evidence);
    return evidence;
  }

  /**
   * Lets nothing but sound bytes through.
   *
   * @throws AppError EVIDENCE_DAMAGED, EVIDENCE_MISSING
   */
  async ensureSound(sha256: string): Promise<void> {
    const facts = await this.store.stat(sha256);
    const known = this.#checked.get(sha256);
    if (facts && known && known.stamp === stampOf(facts) && Date.now() - known.atMs < CHECK_HOLDS_MS) return;
    const evidence = await this.check(sha256);
    if (evidence === 'damaged') {
      throw new AppError('EVIDENCE_DAMAGED', {
        detail:
          'The stored bytes no longer have the SHA-256 they were stored under, so they are not handed out.',
        remedy: 'Upload the original file again: equal bytes restore it.',
      });
    }
    if (evidence === 'missing') {
      throw new AppError('EVIDENCE_MISSING', {
        detail: 'The stored file is gone from the storage.',
        remedy: 'Upload the original file again: equal bytes restore it.',
      });
    }
  }

  async note(sha256: string, evidence: Evidence): Promise<void> {
    const rows: [{ before: Evidence }[], number] = await this.dataSource.query(
      `UPDATE stored_object AS o SET evidence = $2, checked_at = now()
       FROM (SELECT sha256, evidence FROM stored_object WHERE sha256 = $1 FOR UPDATE) AS old
       WHERE o.sha256 = old.sha256 RETURNING old.evidence AS before`,
      [sha256, evidence],
    );
    const before = rows[0][0]?.before;
    if (before === 'sound' && evidence !== 'sound')
      this.#logger.error(`stored object ${sha256} is ${evidence}`);
  }

  private async compare(sha256: string): Promise<Evidence> {
    const hash = createHash('sha256');
    try {
      for await (const chunk of (await this.store.read(sha256)) as AsyncIterable<Buffer>) hash.update(chunk);
    } catch (error) {
      if (error instanceof ObjectMissingError) return 'missing';
      throw error;
    }
    return hash.digest('hex') === sha256 ? 'sound' : 'damaged';
  }

  private remember(sha256: string, stamp: string): void {
    const [oldest] = this.#checked.keys();
    if (oldest !== undefined && this.#checked.size >= REMEMBERED_MAX) this.#checked.delete(oldest);
    this.#checked.set(sha256, { stamp, atMs: Date.now() });
  }
}

function stampOf(facts: { sizeBytes: number; storedAt: Date }): string {
  return `${facts.sizeBytes}@${facts.storedAt.getTime()}`;
}
