import { Injectable } from '@nestjs/common';
import { Brackets, DataSource, type EntityManager } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { ApiTokensService } from '../auth/api-tokens/api-tokens.service';
import { SessionsService } from '../auth/sessions/sessions.service';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import type { Role } from '../common/roles';
import { searchPatterns } from '../common/search-words';
import { isUniqueViolation } from '../database/database-errors';
import type { PersonDto, UpdatePersonDto } from './dto/person.dto';
import { Person } from './person.entity';
import { PersonRole } from './person-role.entity';

const PEOPLE_MAX = 500;
/** Any constant: whoever changes who is an administrator waits for whoever does so at the same moment. */
const ADMINISTRATORS_LOCK = 4_870_001;

export interface NewPerson {
  readonly displayName: string;
  readonly email: string;
  readonly passwordHash: string;
  readonly roles: readonly Role[];
}

@Injectable()
export class PeopleService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly sessions: SessionsService,
    private readonly apiTokens: ApiTokensService,
    private readonly audit: AuditService,
  ) {}

  /** @throws AppError EMAIL_TAKEN */
  async create(tx: EntityManager, { displayName, email, passwordHash, roles }: NewPerson): Promise<Person> {
    try {
      const { identifiers } = await tx.insert(Person, {
        displayName,
        email: email.toLowerCase(),
        passwordHash,
      });
      const { id } = identifiers[0] as { id: string };
      await tx.insert(
        PersonRole,
        roles.map((role) => ({ personId: id, role })),
      );
      return await tx.findOneByOrFail(Person, { id });
    } catch (error) {
      if (isUniqueViolation(error, 'uq_person_email')) throw new AppError('EMAIL_TAKEN');
      throw error;
    }
  }

  findByEmail(email: string): Promise<Person | null> {
    return this.dataSource.getRepository(Person).findOneBy({ email: email.toLowerCase() });
  }

  /** @throws AppError NOT_FOUND */
  async get(id: string): Promise<PersonDto> {
    const person = await this.dataSource.getRepository(Person).findOneBy({ id });
    if (!person) throw new AppError('NOT_FOUND');
    const [dto] = await this.#withRoles([person]);
    return dto as PersonDto;
  }

  async list(q: string | undefined): Promise<PersonDto[]> {
    const query = this.dataSource
      .createQueryBuilder(Person, 'person')
      .orderBy('lower(person.display_name)')
      .addOrderBy('person.id')
      .take(PEOPLE_MAX);
    for (const [index, pattern] of searchPatterns(q).entries()) {
      const name = `pattern${index}`;
      query.andWhere(
        new Brackets((either) => {
          either
            .orWhere(`person.displayName ILIKE :${name}`, { [name]: pattern })
            .orWhere(`person.email ILIKE :${name}`, { [name]: pattern });
        }),
      );
    }
    return this.#withRoles(await query.getMany());
  }

  async rename(id: string, displayName: string): Promise<PersonDto> {
    await this.dataSource.getRepository(Person).update({ id }, { displayName });
    return this.get(id);
  }

  /**
   * Changes roles or shuts an account; the person's sessions and tokens end with it, at once.
   *
   * @throws AppError NOT_FOUND; LAST_ADMINISTRATOR when nobody would be left to undo it
   */
  async update(actor: Actor, id: string, { roles, isDisabled }: UpdatePersonDto): Promise<PersonDto> {
    const before = await this.get(id);
    await this.dataSource.transaction(async (tx) => {
      await tx.query('SELECT pg_advisory_xact_lock($1)', [ADMINISTRATORS_LOCK]);
      if (roles !== undefined) {
        await tx.delete(PersonRole, { personId: id });
        if (roles.length > 0) {
          await tx.insert(
            PersonRole,
            roles.map((role) => ({ personId: id, role })),
          );
        }
      }
      if (isDisabled !== undefined) await tx.update(Person, { id }, { isDisabled });
      await this.#assertSomeAdministrator(tx);
      await this.sessions.endAll(id, tx);
      if (isDisabled === true) await this.apiTokens.removeAll(id, tx);
      await this.#recordChange(tx, actor, before, { roles, isDisabled });
    });
    return this.get(id);
  }

  async #recordChange(
    tx: EntityManager,
    actor: Actor,
    before: PersonDto,
    { roles, isDisabled }: UpdatePersonDto,
  ): Promise<void> {
    const subject = `person:${before.id}`;
    if (roles !== undefined) {
      const words = (list: readonly string[]) => (list.length === 0 ? 'no role' : list.join(', '));
      const detail = `${before.displayName}: ${words(before.roles)} became ${words(roles)}`;
      await this.audit.record(actor, { action: 'person.roles-changed', subject, detail }, tx);
    }
    if (isDisabled !== undefined && isDisabled !== before.isDisabled) {
      const action = isDisabled ? 'person.disabled' : 'person.enabled';
      await this.audit.record(actor, { action, subject, detail: before.displayName }, tx);
    }
  }

  async #assertSomeAdministrator(tx: EntityManager): Promise<void> {
    const [row] = await tx.query<{ count: number }[]>(
      `SELECT count(*)::int AS count FROM person_role r JOIN person p ON p.id = r.person_id
        WHERE r.role = 'administrator' AND NOT p.is_disabled`,
    );
    if (row?.count === 0) throw new AppError('LAST_ADMINISTRATOR');
  }

  async #withRoles(people: readonly Person[]): Promise<PersonDto[]> {
    const rows = await this.dataSource.query<{ person_id: string; role: Role }[]>(
      'SELECT person_id, role FROM person_role WHERE person_id = ANY($1) ORDER BY role',
      [people.map(({ id }) => id)],
    );
    return people.map((person) => ({
      id: person.id,
      displayName: person.displayName,
      email: person.email,
      roles: rows.filter((row) => row.person_id === person.id).map(({ role }) => role),
      isDisabled: person.isDisabled,
      createdAt: person.createdAt.toISOString(),
      lastSeenAt: person.lastSeenAt?.toISOString() ?? null,
    }));
  }
}
