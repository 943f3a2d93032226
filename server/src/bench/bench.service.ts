import { Injectable } from '@nestjs/common';
import { DataSource, type EntityManager } from 'typeorm';
import { AuditService } from '../audit/audit.service';
import { createOpaqueToken, hashToken } from '../auth/opaque-token';
import { PasswordHasher } from '../auth/passwords/password-hasher';
import { assertGoodPassword } from '../auth/passwords/password-rules';
import type { Actor } from '../common/actor';
import { AppError } from '../common/app-error';
import { PeopleService } from '../people/people.service';
import type { Person } from '../people/person.entity';
import { Bench } from './bench.entity';
import type { SetupDto } from './dto/setup.dto';

const BENCH_ID = 1;

export interface BenchDescription {
  readonly name: string;
  /** True until somebody has been made administrator. */
  readonly isFirstRun: boolean;
}

@Injectable()
export class BenchService {
  constructor(
    private readonly dataSource: DataSource,
    private readonly people: PeopleService,
    private readonly hasher: PasswordHasher,
    private readonly audit: AuditService,
  ) {}

  async describe(): Promise<BenchDescription> {
    const [row] = await this.dataSource.query<{ name: string; is_first_run: boolean }[]>(
      'SELECT name, NOT EXISTS (SELECT 1 FROM person) AS is_first_run FROM bench WHERE id = $1',
      [BENCH_ID],
    );
    return { name: row?.name ?? '', isFirstRun: row?.is_first_run ?? true };
  }

  /**
   * Makes the one-time secret of an empty bench; one that was made before no longer works.
   *
   * @returns the secret, to be shown where the server was started; null when there are people already
   */
  async makeSetupSecret(): Promise<string | null> {
    if (!(await this.describe()).isFirstRun) return null;
    const secret = createOpaqueToken();
    await this.dataSource
      .getRepository(Bench)
      .update({ id: BENCH_ID }, { setupSecretHash: hashToken(secret) });
    return secret;
  }

  /**
   * Makes the first administrator, who is reviewer and technician too: a bench of one holds them all.
   *
   * @throws AppError NOT_FOUND once there are people; WRONG_SECRET; VALIDATION_FAILED
   */
  async setUp(actor: Actor, { secret, benchName, displayName, email, password }: SetupDto): Promise<Person> {
    if (!(await this.describe()).isFirstRun) throw new AppError('NOT_FOUND');
    assertGoodPassword(password, { email, displayName, benchName });
    const passwordHash = await this.hasher.hash(password);
    return this.dataSource.transaction(async (tx) => {
      await this.#spendSecret(tx, secret);
      await tx.update(Bench, { id: BENCH_ID }, { name: benchName, setupSecretHash: null });
      const person = await this.people.create(tx, {
        displayName,
        email,
        passwordHash,
        roles: ['administrator', 'reviewer', 'technician'],
      });
      await this.audit.record(actor, { action: 'bench.set-up', subject: `person:${person.id}`, person }, tx);
      return person;
    });
  }

  /** The locked row decides between requests that race. */
  async #spendSecret(tx: EntityManager, secret: string): Promise<void> {
    const bench = await tx.findOneOrFail(Bench, {
      where: { id: BENCH_ID },
      lock: { mode: 'pessimistic_write' },
    });
    if (bench.setupSecretHash === null) throw new AppError('NOT_FOUND');
    if (bench.setupSecretHash !== hashToken(secret)) throw new AppError('WRONG_SECRET');
  }
}
