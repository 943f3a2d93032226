import { Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import { PeopleService } from '../people/people.service';
import { Person } from '../people/person.entity';
import { accountKey, addressKey, AttemptsService } from './attempts/attempts.service';
import type { SignInDto } from './dto/session.dto';
import { PasswordHasher } from './passwords/password-hasher';
import { SessionsService } from './sessions/sessions.service';

/** Checks an e-mail address and a password. Unknown address, wrong password and shut account all look the same. */
@Injectable()
export class SignInService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly people: PeopleService,
    private readonly hasher: PasswordHasher,
    private readonly sessions: SessionsService,
    private readonly attempts: AttemptsService,
    private readonly audit: AuditService,
  ) {}

  /** @throws AppError WRONG_CREDENTIALS; TOO_MANY_REQUESTS after too many of those */
  async check(actor: Actor, { email, password }: SignInDto): Promise<Person> {
    const [account, address] = [accountKey('sign-in', email), addressKey('sign-in', actor.ip)];
    // The account is counted first: what its limit refuses is not held against everybody else behind the address.
    await this.attempts.assertFree(address);
    await this.attempts.begin(account);
    await this.attempts.begin(address);
    const person = await this.people.findByEmail(email);
    const isRight = person
      ? await this.hasher.verify(person.passwordHash, password)
      : await this.hasher.verifyNothing(password);
    if (!person || !isRight || person.isDisabled) {
      await this.audit.record(actor, {
        action: 'session.refused',
        detail: person ? `for ${person.displayName}` : 'for an unknown address',
      });
      throw new AppError('WRONG_CREDENTIALS');
    }
    await this.attempts.forget(account);
    await this.attempts.takeBack(address);
    if (this.hasher.isOutdated(person.passwordHash)) await this.#renewHash(person.id, password);
    await this.audit.record(actor, { action: 'session.opened', person });
    await this.sessions.removeExpired();
    return person;
  }

  async #renewHash(id: string, password: string): Promise<void> {
    const passwordHash = await this.hasher.hash(password);
    await this.dataSource.getRepository(Person).update({ id }, { passwordHash });
  }
}
