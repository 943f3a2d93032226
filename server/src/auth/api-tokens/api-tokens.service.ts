import { Injectable } from '@nestjs/common';
import { DataSource, type EntityManager } from 'typeorm';
import { AppError } from '../../common/app-error';
import type { SignedInPerson } from '../../common/actor';
import type { Role } from '../../common/roles';
import { createOpaqueToken, hashToken } from '../opaque-token';
import { ApiToken } from './api-token.entity';

/** Lets a person, or a secret scanner, see what kind of thing leaked. */
const PREFIX = 'blk_';
const TOKENS_PER_PERSON_MAX = 50;

interface TokenRow {
  token_id: string;
  is_used_long_ago: boolean;
  person_id: string;
  display_name: string;
  email: string;
  roles: Role[];
}

@Injectable()
export class ApiTokensService {
  constructor(private readonly dataSource: DataSource) {}

  /** @returns the row, and the token itself, which can't be had a second time */
  async create(personId: string, name: string): Promise<{ apiToken: ApiToken; token: string }> {
    const repository = this.dataSource.getRepository(ApiToken);
    if ((await repository.countBy({ personId })) >= TOKENS_PER_PERSON_MAX) {
      throw new AppError('CONFLICT', {
        detail: `${TOKENS_PER_PERSON_MAX} tokens are the most; delete one first.`,
      });
    }
    const token = `${PREFIX}${createOpaqueToken()}`;
    const { identifiers } = await repository.insert({ personId, name, tokenHash: hashToken(token) });
    const apiToken = await repository.findOneByOrFail({ id: (identifiers[0] as { id: string }).id });
    return { apiToken, token };
  }

  async find(token: string): Promise<SignedInPerson | null> {
    if (!token.startsWith(PREFIX)) return null;
    const [row] = await this.dataSource.query<TokenRow[]>(
      `SELECT t.id AS token_id, p.id AS person_id, p.display_name, p.email,
              coalesce(t.last_used_at < now() - interval '1 minute', true) AS is_used_long_ago,
              array(SELECT role FROM person_role r WHERE r.person_id = p.id ORDER BY role) AS roles
         FROM api_token t JOIN person p ON p.id = t.person_id
        WHERE t.token_hash = $1 AND NOT p.is_disabled`,
      [hashToken(token)],
    );
    if (!row) return null;
    if (row.is_used_long_ago) {
      await this.dataSource.query('UPDATE api_token SET last_used_at = now() WHERE id = $1', [row.token_id]);
    }
    return {
      id: row.person_id,
      displayName: row.display_name,
      email: row.email,
      roles: row.roles,
      sessionId: null,
      apiTokenId: row.token_id,
    };
  }

  list(personId: string): Promise<ApiToken[]> {
    return this.dataSource
      .getRepository(ApiToken)
      .find({ where: { personId }, order: { createdAt: 'DESC' } });
  }

  /** @returns false when the person has no such token */
  async remove(personId: string, id: string): Promise<boolean> {
    const { affected } = await this.dataSource.getRepository(ApiToken).delete({ id, personId });
    return affected === 1;
  }

  async removeAll(personId: string, manager: EntityManager): Promise<void> {
    await manager.delete(ApiToken, { personId });
  }
}
