import type { Server } from 'node:http';
import { hash, argon2id } from 'argon2';
import request, { type Response } from 'supertest';
import type { DataSource } from 'typeorm';
import type { Role } from '../../src/common/roles';
import { PersonRole } from '../../src/people/person-role.entity';
import { Person } from '../../src/people/person.entity';

export const GOOD_PASSWORD = 'seven lanterns uphill';

/** Puts a person straight into the database; everything else about them comes from `overrides`. */
export async function createPerson(
  dataSource: DataSource,
  roles: Role[],
  overrides: Partial<Pick<Person, 'displayName' | 'email' | 'passwordHash' | 'isDisabled'>> = {},
): Promise<{ id: string; email: string }> {
  const email =
    overrides.email ?? `${roles.join('-') || 'nobody'}-${Math.random().toString(36).slice(2)}@example.org`;
  const passwordHash = await hash(GOOD_PASSWORD, {
    type: argon2id,
    memoryCost: 64,
    timeCost: 2,
    parallelism: 1,
  });
  const person = { displayName: 'Wren Calloway', passwordHash, ...overrides, email };
  const { identifiers } = await dataSource.getRepository(Person).insert(person);
  const { id } = identifiers[0] as { id: string };
  if (roles.length > 0)
    await dataSource.getRepository(PersonRole).insert(roles.map((role) => ({ personId: id, role })));
  return { id, email };
}

type Method = 'get' | 'post' | 'patch' | 'put' | 'delete';

/** Behaves as the app does in a browser: keeps its cookies and sends the CSRF token it was given. */
export class Browser {
  readonly agent: ReturnType<typeof request.agent>;
  csrfToken = '';

  constructor(server: Server) {
    this.agent = request.agent(server);
  }

  async visit(): Promise<Response> {
    const answer = await this.agent.get('/api/session').expect(200);
    this.csrfToken = (answer.body as { csrfToken: string }).csrfToken;
    return answer;
  }

  send(method: Method, path: string, body?: object, headers: Record<string, string> = {}): request.Test {
    const sent = this.agent[method](path).set({ 'x-csrf-token': this.csrfToken, ...headers });
    return body === undefined ? sent : sent.send(body);
  }

  async signIn(email: string, password: string = GOOD_PASSWORD): Promise<Response> {
    if (this.csrfToken === '') await this.visit();
    const answer = await this.send('post', '/api/session', { email, password });
    if (answer.status === 201) this.csrfToken = (answer.body as { csrfToken: string }).csrfToken;
    return answer;
  }
}

/** A person with these roles, signed in. */
export async function signedIn(
  { server, dataSource }: { server: Server; dataSource: DataSource },
  ...roles: Role[]
): Promise<{ browser: Browser; id: string; email: string }> {
  const person = await createPerson(dataSource, roles);
  const browser = new Browser(server);
  const answer = await browser.signIn(person.email);
  if (answer.status !== 201) throw new Error(`sign-in answered ${answer.status}: ${answer.text}`);
  return { browser, ...person };
}
