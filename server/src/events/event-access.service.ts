import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import type { SignedInPerson } from '../common/actor';
import type { Role } from '../common/roles';

export const EVENT_ROLES = ['technician', 'reviewer', 'administrator'] as const satisfies readonly Role[];

/** Whether a stream that was opened a while ago may go on. */
@Injectable()
export class EventAccess {
  constructor(private readonly dataSource: DataSource) {}

  async mayGoOn({ id, sessionId, apiTokenId }: SignedInPerson): Promise<boolean> {
    const rows = await this.dataSource.query<unknown[]>(
      `SELECT 1 FROM person AS p WHERE p.id = $1 AND NOT p.is_disabled
         AND EXISTS (SELECT 1 FROM person_role WHERE person_id = p.id AND role = ANY ($2))
         AND ($3::uuid IS NULL OR EXISTS (SELECT 1 FROM session WHERE id = $3))
         AND ($4::uuid IS NULL OR EXISTS (SELECT 1 FROM api_token WHERE id = $4))`,
      [id, EVENT_ROLES, sessionId, apiTokenId],
    );
    return rows.length > 0;
  }
}
