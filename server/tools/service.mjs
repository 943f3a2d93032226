// The built product on a free loopback port with a database and a store of its own, for the benchmark and the
// end-to-end tests.
import { randomBytes } from 'node:crypto';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';
import { findFreePort } from './postgres.mjs';
import { ROOT, startProcess } from './workspace.mjs';

async function withAdmin(adminUrl, work) {
  const client = new pg.Client({ connectionString: adminUrl });
  await client.connect();
  try {
    return await work(client);
  } finally {
    await client.end();
  }
}

function launch(script, env, onLine) {
  const ended = makeResolvers();
  const child = startProcess(process.execPath, [path.join(ROOT, 'server/dist', script)], {
    env,
    stdio: ['ignore', 'pipe', 'pipe'],
    onEnd: ended.resolve,
  });
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding('utf8');
    stream.on('data', onLine);
  }
  return { child, ended: ended.promise };
}

function makeResolvers() {
  const resolvers = {};
  resolvers.promise = new Promise((resolve, reject) => Object.assign(resolvers, { resolve, reject }));
  return resolvers;
}

/**
 * Starts web server and worker on a fresh database.
 *
 * @param options.adminUrl - a PostgreSQL connection that may create databases
 * @param options.env - further variables for both processes
 * @param options.seed - a script below server/dist to run before the start
 */
export async function startService({ adminUrl, env = {}, seed = null }) {
  const database = `service_${randomBytes(6).toString('hex')}`;
  await withAdmin(adminUrl, (client) => client.query(`create database "${database}"`));
  const folder = mkdtempSync(path.join(tmpdir(), 'benchlark-'));
  const port = await findFreePort();
  const url = `http://127.0.0.1:${port}`;
  const databaseUrl = Object.assign(new URL(adminUrl), { pathname: `/${database}` }).href;
  const fullEnv = {
    NODE_ENV: 'development',
    HOST: '127.0.0.1',
    PORT: String(port),
    PUBLIC_URL: url,
    DATABASE_URL: databaseUrl,
    SESSION_SECRET: randomBytes(32).toString('hex'),
    STORE_DIR: path.join(folder, 'store'),
    LOG_LEVEL: 'warn',
    ...env,
  };
  let log = '';
  const keep = (text) => (log += text);
  const runToEnd = async (script) => {
    const code = await launch(script, fullEnv, keep).ended;
    if (code !== 0) throw new Error(`${script} ended with ${code}:\n${log}`);
  };
  await runToEnd('database/migrate.js');
  if (seed) await runToEnd(seed);
  const web = launch('main.js', fullEnv, keep);
  let worker = launch('worker.js', fullEnv, keep);
  const service = {
    url,
    databaseUrl,
    folder,
    storeDir: fullEnv.STORE_DIR,
    webPid: web.child.pid,
    get log() {
      return log;
    },
    get workerPid() {
      return worker.child.pid;
    },
    /** Ends the worker as a crash would, and starts another. */
    async replaceWorker() {
      worker.child.kill('SIGKILL');
      await worker.ended;
      worker = launch('worker.js', fullEnv, keep);
    },
    async stop() {
      for (const { child } of [web, worker]) child.kill('SIGTERM');
      await Promise.race([Promise.all([web.ended, worker.ended]), sleep(15_000)]);
      for (const { child } of [web, worker]) child.kill('SIGKILL');
      await withAdmin(adminUrl, (client) =>
        client.query(`drop database if exists "${database}" with (force)`),
      );
      rmSync(folder, { recursive: true, force: true });
    },
  };
  for (let attempt = 0; attempt < 300; attempt++) {
    const answer = await fetch(`${url}/api/health/ready`).catch(() => null);
    if (answer?.ok) return service;
    if (web.child.exitCode !== null) break;
    await sleep(100);
  }
  await service.stop();
  throw new Error(`the server did not become ready:\n${log}`);
}

/** Signs in and gives a fetch that carries the session and the CSRF token. */
export async function signIn(url, email, password) {
  const jar = new Map();
  const keepCookies = (answer) => {
    for (const line of answer.headers.getSetCookie()) {
      const [pair] = line.split(';');
      const at = pair.indexOf('=');
      jar.set(pair.slice(0, at), pair.slice(at + 1));
    }
  };
  const cookie = () => [...jar].map(([name, value]) => `${name}=${value}`).join('; ');
  const open = await fetch(`${url}/api/session`);
  keepCookies(open);
  let { csrfToken } = await open.json();
  const call = async (pathName, init = {}) => {
    const headers = { cookie: cookie(), 'x-csrf-token': csrfToken, origin: url, ...init.headers };
    const answer = await fetch(`${url}${pathName}`, { ...init, headers });
    keepCookies(answer);
    return answer;
  };
  const answer = await call('/api/session', {
    method: 'POST',
    headers: { 'content-type': 'application/json' },
    body: JSON.stringify({ email, password }),
  });
  if (answer.status !== 201)
    throw new Error(`signing in as ${email} answered ${answer.status}: ${await answer.text()}`);
  ({ csrfToken } = await answer.json());
  return Object.assign(call, {
    headers: () => ({ cookie: cookie(), 'x-csrf-token': csrfToken, origin: url }),
  });
}
