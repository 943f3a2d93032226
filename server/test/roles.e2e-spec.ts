import { readFileSync, writeFileSync } from 'node:fs';
import type { AddressInfo } from 'node:net';
import { resolve } from 'node:path';
import { ROLES } from '../src/common/roles';
import { createBench, type Bench } from './support/bench';
import { signedIn } from './support/browser';

const TABLE_FILE = resolve(__dirname, 'role-table.json');
const CALLERS = ['anonymous', ...ROLES] as const;
type Caller = (typeof CALLERS)[number];
/** Expected status by caller; ids in the paths name nothing, bodies are empty. */
type Row = Record<Caller, number>;

const SIGN_OUT = 'DELETE /api/session';
const ID_OF_NOTHING = '00000000-0000-4000-8000-000000000000';

interface Layer {
  readonly route?: { readonly path: string; readonly methods: Record<string, boolean> };
}

/** Every route the application answers, as `GET /api/units/:id`; taken from the router itself, so that none is missed. */
function routesOf(bench: Bench): string[] {
  const express = bench.app.getHttpAdapter().getInstance() as { router: { stack: Layer[] } };
  return (
    express.router.stack
      .flatMap(({ route }) =>
        route ? Object.keys(route.methods).map((method) => `${method.toUpperCase()} ${route.path}`) : [],
      )
      .filter((route) => route.includes(' /api/') && !route.includes('*')) // the logger's middleware stands on a wildcard
      // Signing out comes last: the sessions are needed until then.
      .sort((a, b) => Number(a === SIGN_OUT) - Number(b === SIGN_OUT) || (a < b ? -1 : 1))
  );
}

async function statusOf(bench: Bench, route: string, session: Record<string, string>): Promise<number> {
  const [method = '', path = ''] = route.split(' ');
  const filled = path.replace(':sha256', 'f'.repeat(64)).replace(/:\w+/g, ID_OF_NOTHING);
  const { port } = bench.server.address() as AddressInfo;
  const hasBody = method !== 'GET' && method !== 'HEAD';
  // A stream of events never ends by itself: its head is all that is asked for.
  const ending = new AbortController();
  const answer = await fetch(`http://127.0.0.1:${port}${filled}`, {
    method,
    signal: ending.signal,
    headers: {
      ...session,
      ...(hasBody ? { 'Content-Type': 'application/json' } : {}),
    },
    ...(hasBody ? { body: '{}' } : {}),
  });
  ending.abort();
  return answer.status;
}

/** Headers of a browser in which a person with the role has signed in. */
async function sessionOf(bench: Bench, caller: Caller): Promise<Record<string, string>> {
  if (caller === 'anonymous') return {};
  const { browser } = await signedIn(bench, caller);
  const cookies = browser.agent.jar.getCookies({
    domain: '127.0.0.1',
    path: '/',
    secure: false,
    script: false,
  });
  return { Cookie: cookies.toValueString(), 'x-csrf-token': browser.csrfToken };
}

describe('who may call what', () => {
  let bench: Bench;
  beforeAll(async () => {
    bench = await createBench();
  });
  afterAll(() => bench.close());

  it('is for every route and every role what the table says', async () => {
    const found: Record<string, Row> = {};
    const sessions = {} as Record<Caller, Record<string, string>>;
    for (const caller of CALLERS) sessions[caller] = await sessionOf(bench, caller);
    for (const route of routesOf(bench)) {
      const row = {} as Row;
      for (const caller of CALLERS) row[caller] = await statusOf(bench, route, sessions[caller]);
      found[route] = row;
    }
    // For whoever adds a route: writes the table as it is now, to be read line by line before it is committed.
    if (process.env['WRITE_ROLE_TABLE']) writeFileSync(TABLE_FILE, `${JSON.stringify(found, null, 2)}\n`);
    expect(found).toEqual(JSON.parse(readFileSync(TABLE_FILE, 'utf8')));
  });

  it('lets nobody in who is not signed in, except where a route says that it is public', () => {
    const table = JSON.parse(readFileSync(TABLE_FILE, 'utf8')) as Record<string, Row>;
    const archive =
      /^\w+ \/api\/(units|conditions|rigs|captures|records|jobs|today|events|audit|people)(\/|$)/;
    for (const [route, row] of Object.entries(table)) {
      if (!archive.test(route)) continue;
      expect({ route, status: row.anonymous }).toEqual({ route, status: 401 });
      for (const caller of ['peer', 'reader'] as const) {
        expect({ route, status: row[caller] }).toEqual({ route, status: 403 });
      }
    }
  });
});
