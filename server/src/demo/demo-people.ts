import type { INestApplicationContext } from '@nestjs/common';
import { DataSource } from 'typeorm';
import { PasswordHasher } from '../auth/passwords/password-hasher';
import { Bench } from '../bench/bench.entity';
import type { SignedInPerson } from '../common/actor';
import { PeopleService } from '../people/people.service';
import { DEMO_ACCOUNTS, DEMO_BENCH_NAME, type DemoAccount } from './demo-accounts';

/** Makes the demo's people where they are not there yet; gives the reviewer, under whose name the demo is filled. */
export async function ensureDemoPeople(context: INestApplicationContext): Promise<SignedInPerson> {
  const dataSource = context.get(DataSource);
  await dataSource.getRepository(Bench).update({ id: 1 }, { name: DEMO_BENCH_NAME, setupSecretHash: null });
  for (const account of DEMO_ACCOUNTS) await ensurePerson(context, account);
  const reviewer = DEMO_ACCOUNTS.find(({ roles }) => roles.includes('reviewer'));
  const person = reviewer && (await context.get(PeopleService).findByEmail(reviewer.email));
  if (!reviewer || !person) throw new Error('the demo has no reviewer');
  const { id, displayName, email } = person;
  return { id, displayName, email, roles: reviewer.roles, sessionId: null, apiTokenId: null };
}

async function ensurePerson(context: INestApplicationContext, account: DemoAccount): Promise<void> {
  const people = context.get(PeopleService);
  if (await people.findByEmail(account.email)) return;
  const passwordHash = await context.get(PasswordHasher).hash(account.password);
  await context.get(DataSource).transaction((tx) => people.create(tx, { ...account, passwordHash }));
}
