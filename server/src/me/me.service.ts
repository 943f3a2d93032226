import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { accountKey, AttemptsService } from '../auth/attempts/attempts.service';
import { PasswordHasher } from '../auth/passwords/password-hasher';
import { assertGoodPassword } from '../auth/passwords/password-rules';
import { Session } from '../auth/sessions/session.entity';
import { BenchService } from '../bench/bench.service';
import type { Actor, SignedInPerson } from '../common/actor';
import { AppError } from '../common/app-error';
import { Person } from '../people/person.entity';
import type { ChangePasswordDto } from './dto/me.dto';

@Injectable()
export class MeService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly hasher: PasswordHasher,
    private readonly attempts: AttemptsService,
    private readonly bench: BenchService,
    private readonly audit: AuditService,
  ) {}

  /**
   * Changes the password and ends every other session of the person.
   *
   * @throws AppError VALIDATION_FAILED naming the field that is wrong
   */
  async changePassword(
    actor: Actor,
    person: SignedInPerson,
    { currentPassword, newPassword }: ChangePasswordDto,
  ): Promise<void> {
    const key = accountKey('password', person.email);
    await this.attempts.begin(key);
    const { passwordHash: before } = await this.dataSource
      .getRepository(Person)
      .findOneByOrFail({ id: person.id });
    if (!(await this.hasher.verify(before, currentPassword))) {
      throw new AppError('VALIDATION_FAILED', { fields: { currentPassword: ['is not your password'] } });
    }
    await this.attempts.forget(key);
    const { name: benchName } = await this.bench.describe();
    assertGoodPassword(newPassword, { ...person, benchName }, 'newPassword');
    const passwordHash = await this.hasher.hash(newPassword);
    await this.dataSource.transaction(async (tx) => {
      await tx.update(Person, { id: person.id }, { passwordHash });
      await tx
        .createQueryBuilder()
        .delete()
        .from(Session)
        .where('person_id = :personId AND id IS DISTINCT FROM :sessionId', {
          personId: person.id,
          sessionId: person.sessionId,
        })
        .execute();
      await this.audit.record(actor, { action: 'password.changed', subject: `person:${person.id}` }, tx);
    });
  }
}
