// npm start: sets up, then serves the whole product on one loopback port until Ctrl-C.
//   npm start -- --empty    begins without the demo bench (a first administrator is then made with a one-time secret)
import { spawnSync } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { findFreePort, startCluster, stopCluster } from './postgres.mjs';
import { setup } from './setup.mjs';
import { ROOT, RUN_DIR, startProcess } from './workspace.mjs';

const STOP_DEADLINE_MS = 25_000;
const KIND_FILE = path.join(RUN_DIR, 'bench-kind');

/** Kept between starts, so that nobody is signed out by one. */
function readOrMakeSecret() {
  const file = path.join(RUN_DIR, 'session-secret');
  mkdirSync(RUN_DIR, { recursive: true });
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 });
  return readFileSync(file, 'utf8').trim();
}

/** Whether this checkout's bench is the demo one is settled by its first start. */
function isDemoBench() {
  if (process.env.DEMO) return process.env.DEMO === 'true';
  if (!existsSync(KIND_FILE)) writeFileSync(KIND_FILE, process.argv.includes('--empty') ? 'empty' : 'demo');
  return readFileSync(KIND_FILE, 'utf8') === 'demo';
}

async function choosePort() {
  if (process.env.PORT) return Number(process.env.PORT);
  const { createServer } = await import('node:net');
  const isFree = await new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(4870, '127.0.0.1', () => probe.close(() => resolve(true)));
  });
  return isFree ? 4870 : findFreePort();
}

function runStep(script, env) {
  const result = spawnSync(process.execPath, [path.join(ROOT, 'server/dist', script)], {
    cwd: ROOT,
    stdio: 'inherit',
    env: { ...process.env, ...env },
  });
  if (result.status !== 0) throw new Error(`${script} ended with ${result.status ?? result.signal}`);
}

async function waitUntilReady(url, isOver) {
  for (let attempt = 0; attempt < 300 && !isOver(); attempt++) {
    const answer = await fetch(`${url}/api/health/ready`).catch(() => null);
    if (answer?.ok) return true;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
  return false;
}

async function announce(url) {
  const { demo } = await (await fetch(`${url}/api/session`)).json();
  console.log(`\nBenchlark is at ${url}`);
  for (const { displayName, email, password, roles } of demo?.accounts ?? []) {
    console.log(`  ${displayName}, ${roles.join(' and ')}: ${email}, password ${password}`);
  }
  console.log('Stop it with Ctrl-C. What you store stays for the next start.\n');
}

/** Runs web server and worker until one of them ends or somebody stops us. */
async function serve(env, announce) {
  const children = new Set();
  let isStopping = false;
  let exitCode = 0;
  const stop = (signal) => {
    if (isStopping) {
      for (const child of children) child.kill('SIGKILL');
      return;
    }
    isStopping = true;
    for (const child of children) child.kill(signal);
    setTimeout(() => children.forEach((child) => child.kill('SIGKILL')), STOP_DEADLINE_MS).unref();
  };
  process.on('SIGINT', () => stop('SIGTERM'));
  process.on('SIGTERM', () => stop('SIGTERM'));
  const ended = ['main.js', 'worker.js'].map(
    (script) =>
      new Promise((resolve) => {
        const child = startProcess(process.execPath, [path.join(ROOT, 'server/dist', script)], {
          env,
          // A group of its own: Ctrl-C reaches only this process, which then stops the others in order.
          detached: true,
          onEnd: (code) => {
            children.delete(child);
            if (!isStopping) {
              exitCode = code || 1;
              console.error(`benchlark: ${script} ended by itself with ${code}.`);
              stop('SIGTERM');
            }
            resolve();
          },
        });
        children.add(child);
      }),
  );
  if (await waitUntilReady(env.PUBLIC_URL, () => isStopping)) await announce();
  else if (!isStopping) {
    console.error('benchlark: the server is not ready after 30 s; see its messages above.');
    exitCode = 1;
    stop('SIGTERM');
  }
  await Promise.all(ended);
  return exitCode;
}

async function main() {
  await setup();
  const isOwnCluster = !process.env.DATABASE_URL;
  const databaseUrl = isOwnCluster ? (await startCluster()).url : process.env.DATABASE_URL;
  try {
    const port = await choosePort();
    const isDemo = isDemoBench();
    const env = {
      NODE_ENV: process.env.NODE_ENV ?? 'development',
      HOST: '127.0.0.1',
      PORT: String(port),
      PUBLIC_URL: process.env.PUBLIC_URL ?? `http://127.0.0.1:${port}`,
      DATABASE_URL: databaseUrl,
      SESSION_SECRET: process.env.SESSION_SECRET ?? readOrMakeSecret(),
      STORE_DIR: process.env.STORE_DIR ?? path.join(RUN_DIR, 'store'),
      DEMO: String(isDemo),
      LOG_LEVEL: process.env.LOG_LEVEL ?? 'warn',
    };
    runStep('database/migrate.js', env);
    if (isDemo) runStep('demo/seed.js', env);
    const code = await serve(env, () => announce(env.PUBLIC_URL));
    process.exitCode = code;
  } finally {
    if (isOwnCluster) await stopCluster();
  }
}

main().catch((error) => {
  console.error(`benchlark: ${error.message}`);
  process.exitCode = 1;
});
