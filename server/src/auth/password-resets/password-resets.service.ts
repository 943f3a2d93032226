import { Inject, Injectable } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { AuditService } from '../../audit/audit.service';
import { Bench } from '../../bench/bench.entity';
import type { Actor } from '../../common/actor';
import { AppError } from '../../common/app-error';
import { ENV } from '../../config/env.module';
import type { Env } from '../../config/env.schema';
import { MailService } from '../../mail/mail.service';
import { Person } from '../../people/person.entity';
import { ApiTokensService } from '../api-tokens/api-tokens.service';
import { createOpaqueToken, hashToken } from '../opaque-token';
import { PasswordHasher } from '../passwords/password-hasher';
import { assertGoodPassword } from '../passwords/password-rules';
import { SessionsService } from '../sessions/sessions.service';
import { PasswordReset } from './password-reset.entity';

type Addressee = Pick<Person, 'id' | 'displayName' | 'email'>;

/** Links with which somebody chooses a new password: stored hashed, for one use, for an hour. */
@Injectable()
export class PasswordResetsService {
  constructor(
    private readonly dataSource: DataSource,
    @Inject(ENV) private readonly env: Pick<Env, 'PUBLIC_URL' | 'PASSWORD_RESET_MINUTES'>,
    private readonly mail: MailService,
    private readonly hasher: PasswordHasher,
    private readonly sessions: SessionsService,
    private readonly apiTokens: ApiTokensService,
    private readonly audit: AuditService,
  ) {}

  /** Mails a link, whoever asked for it. */
  async askFor(actor: Actor, { id, displayName, email }: Addressee): Promise<void> {
    const token = createOpaqueToken();
    await this.dataSource.transaction(async (tx) => {
      await tx
        .createQueryBuilder()
        .insert()
        .into(PasswordReset)
        .values({
          personId: id,
          tokenHash: hashToken(token),
          expiresAt: () => `now() + make_interval(mins => ${this.env.PASSWORD_RESET_MINUTES})`,
        })
        .execute();
      await this.mail.queue(
        {
          to: email,
          subject: 'A new password for Benchlark',
          text: [
            `Hello ${displayName},`,
            `with this link you choose a new password; it holds for ${this.env.PASSWORD_RESET_MINUTES} minutes and works once:`,
            `${this.env.PUBLIC_URL}/reset#${token}`,
            'If you did not ask for it, do nothing: your password stays as it is.',
          ].join('\n\n'),
        },
        tx,
      );
      await this.audit.record(
        actor,
        { action: 'password.reset-asked', subject: `person:${id}`, detail: displayName },
        tx,
      );
    });
  }

  /**
   * Sets the new password, and signs the person out everywhere.
   *
   * @throws AppError TOKEN_SPENT; VALIDATION_FAILED when the password is not good enough (the link then still holds)
   */
  async complete(actor: Actor, token: string, password: string): Promise<void> {
    const reset = await this.dataSource
      .createQueryBuilder(PasswordReset, 'reset')
      .innerJoinAndSelect('reset.person', 'person')
      .where('reset.token_hash = :hash AND reset.used_at IS NULL AND reset.expires_at > now()', {
        hash: hashToken(token),
      })
      .andWhere('NOT person.is_disabled')
      .getOne();
    if (!reset) throw new AppError('TOKEN_SPENT');
    const { person } = reset;
    const bench = await this.dataSource.getRepository(Bench).findOneByOrFail({ id: 1 });
    assertGoodPassword(password, {
      email: person.email,
      displayName: person.displayName,
      benchName: bench.name,
    });
    const passwordHash = await this.hasher.hash(password);
    await this.dataSource.transaction(async (tx) => {
      // The update decides between requests that race: only one finds the link unused.
      const { affected } = await tx
        .createQueryBuilder()
        .update(PasswordReset)
        .set({ usedAt: () => 'now()' })
        .where('person_id = :personId AND used_at IS NULL', { personId: person.id })
        .andWhere('EXISTS (SELECT 1 FROM password_reset r WHERE r.id = :id AND r.used_at IS NULL)', {
          id: reset.id,
        })
        .execute();
      if (!affected) throw new AppError('TOKEN_SPENT');
      await tx.update(Person, { id: person.id }, { passwordHash });
      await this.sessions.endAll(person.id, tx);
      // Whoever lost the password may have lost more: tokens made with it end too.
      await this.apiTokens.removeAll(person.id, tx);
      await this.audit.record(
        actor,
        { action: 'password.reset', subject: `person:${person.id}`, person },
        tx,
      );
    });
  }
}
