import { Injectable, Logger } from '@nestjs/common';
import { Brackets, DataSource, type EntityManager } from 'typeorm';
import type { Actor, SignedInPerson } from '../common/actor';
import { readCursor, writeCursor } from '../common/cursor';
import { searchPatterns } from '../common/search-words';
import { AuditEntry } from './audit-entry.entity';

/** A fact for the trail. Never put a password, token or mail text into it. */
export interface AuditFact {
  /** Dotted, past tense: `capture.stored`, `person.roles-changed`. */
  readonly action: string;
  /** What it was done to, as `kind:id`. */
  readonly subject?: string;
  /** One plain sentence or phrase. */
  readonly detail?: string;
  /** Somebody who is not signed in yet, e.g. at sign-in. */
  readonly person?: Pick<SignedInPerson, 'id' | 'displayName'>;
}

export interface AuditPage {
  readonly entries: AuditEntry[];
  readonly nextCursor: string | null;
}

@Injectable()
export class AuditService {
  readonly #logger = new Logger('Audit');

  constructor(private readonly dataSource: DataSource) {}

  /**
   * Appends to the audit trail and writes the same as one line of the log.
   *
   * @param actor - who did it, from where; null for the server itself
   * @param manager - the transaction in which the thing itself is done, so that both stand or fall together
   */
  async record(
    actor: Actor | null,
    fact: AuditFact,
    manager: EntityManager = this.dataSource.manager,
  ): Promise<void> {
    const person = fact.person ?? actor?.person ?? null;
    const row = {
      actorId: person?.id ?? null,
      actorName: person?.displayName ?? null,
      action: fact.action,
      subject: fact.subject ?? null,
      detail: fact.detail ?? null,
      ip: actor?.ip ?? null,
      requestId: actor?.requestId ?? null,
    };
    await manager.insert(AuditEntry, row);
    this.#logger.log({ audit: row });
  }

  /** One page of the trail, newest first. */
  async list(page: { q?: string; cursor?: string; limit: number }): Promise<AuditPage> {
    const query = this.dataSource
      .createQueryBuilder(AuditEntry, 'entry')
      .orderBy('entry.id', 'DESC')
      .take(page.limit + 1);
    if (page.cursor !== undefined) {
      const { tie } = readCursor(page.cursor, 'audit', (_, id) => /^\d{1,18}$/.test(id));
      query.andWhere('entry.id < :before', { before: tie });
    }
    for (const [index, pattern] of searchPatterns(page.q).entries()) {
      const name = `pattern${index}`;
      query.andWhere(
        new Brackets((either) => {
          for (const column of ['actorName', 'action', 'subject', 'detail', 'ip']) {
            either.orWhere(`entry.${column} ILIKE :${name}`, { [name]: pattern });
          }
        }),
      );
    }
    const rows = await query.getMany();
    const entries = rows.slice(0, page.limit);
    const last = entries.at(-1);
    const hasMore = rows.length > page.limit && last !== undefined;
    return { entries, nextCursor: hasMore ? writeCursor({ order: 'audit', value: '', tie: last.id }) : null };
  }
}
