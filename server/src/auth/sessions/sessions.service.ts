import { Inject, Injectable } from '@nestjs/common';
import { DataSource, type EntityManager } from 'typeorm';
import type { SignedInPerson } from '../../common/actor';
import type { Role } from '../../common/roles';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { createOpaqueToken, hashToken } from '../opaque-token';
import { Session } from './session.entity';

/** "Last seen" is only kept to the minute: a write for every request would be too many. */
const SEEN_STEP = '1 minute';

interface SessionRow {
  session_id: string;
  is_seen_long_ago: boolean;
  person_id: string;
  display_name: string;
  email: string;
  roles: Role[];
}

@Injectable()
export class SessionsService {
  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Pick<Env, 'SESSION_IDLE_HOURS' | 'SESSION_ABSOLUTE_HOURS'>,
  ) {}

  /** @returns the opaque token that goes into the cookie; only its hash is stored */
  async open(
    personId: string,
    userAgent: string,
    manager: EntityManager = this.dataSource.manager,
  ): Promise<string> {
    const token = createOpaqueToken();
    await manager
      .createQueryBuilder()
      .insert()
      .into(Session)
      .values({
        personId,
        userAgent,
        tokenHash: hashToken(token),
        expiresAt: () => `now() + make_interval(hours => ${this.env.SESSION_ABSOLUTE_HOURS})`,
      })
      .execute();
    return token;
  }

  /** Who holds the session, by the database's clock and as the roles are now; null when it is over. */
  async find(token: string): Promise<SignedInPerson | null> {
    const [row] = await this.dataSource.query<SessionRow[]>(
      `SELECT s.id AS session_id, p.id AS person_id, p.display_name, p.email,
              s.last_seen_at < now() - $3::interval AS is_seen_long_ago,
              array(SELECT role FROM person_role r WHERE r.person_id = p.id ORDER BY role) AS roles
         FROM session s JOIN person p ON p.id = s.person_id
        WHERE s.token_hash = $1 AND NOT p.is_disabled
          AND s.expires_at > now() AND s.last_seen_at > now() - make_interval(hours => $2::int)`,
      [hashToken(token), this.env.SESSION_IDLE_HOURS, SEEN_STEP],
    );
    if (!row) return null;
    if (row.is_seen_long_ago) await this.#touch(row.session_id, row.person_id);
    return {
      id: row.person_id,
      displayName: row.display_name,
      email: row.email,
      roles: row.roles,
      sessionId: row.session_id,
      apiTokenId: null,
    };
  }

  async end(sessionId: string): Promise<void> {
    await this.dataSource.getRepository(Session).delete({ id: sessionId });
  }

  /** @returns false when the person has no such session */
  async endOwn(personId: string, sessionId: string): Promise<boolean> {
    const { affected } = await this.dataSource.getRepository(Session).delete({ id: sessionId, personId });
    return affected === 1;
  }

  /** Signs a person out everywhere, at once. */
  async endAll(personId: string, manager: EntityManager = this.dataSource.manager): Promise<void> {
    await manager.delete(Session, { personId });
  }

  list(personId: string): Promise<Session[]> {
    return this.dataSource
      .createQueryBuilder(Session, 'session')
      .where('session.person_id = :personId AND session.expires_at > now()', { personId })
      .andWhere('session.last_seen_at > now() - make_interval(hours => :hours)', {
        hours: this.env.SESSION_IDLE_HOURS,
      })
      .orderBy('session.last_seen_at', 'DESC')
      .getMany();
  }

  /** Throws away what has ended by itself; such rows let nobody in, they only take room. */
  async removeExpired(): Promise<void> {
    await this.dataSource.query(
      'DELETE FROM session WHERE expires_at < now() OR last_seen_at < now() - make_interval(hours => $1::int)',
      [this.env.SESSION_IDLE_HOURS],
    );
  }

  async #touch(sessionId: string, personId: string): Promise<void> {
    await this.dataSource.query('UPDATE session SET last_seen_at = now() WHERE id = $1', [sessionId]);
    await this.dataSource.query('UPDATE person SET last_seen_at = now() WHERE id = $1', [personId]);
  }
}
