// A private PostgreSQL cluster for this checkout, on loopback only.
//   node server/tools/postgres.mjs start [--test] | stop [--test] | status [--test] | destroy [--test]
// As root the server runs as the user `postgres`, with its data under /var/lib/postgresql (a checkout below a
// root-only folder could not be read by that user); as anyone else it runs as that user, with its data under .run/.
// --test: a throw-away cluster without fsync.
import { spawnSync } from 'node:child_process';
import { createHash, randomBytes } from 'node:crypto';
import {
  existsSync,
  mkdirSync,
  readFileSync,
  readdirSync,
  readlinkSync,
  rmSync,
  writeFileSync,
} from 'node:fs';
import { createServer } from 'node:net';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
// The program's role owns its database and nothing else; only this tool and the tests use the keeper.
const SUPERUSER = 'keeper';
const USER = 'benchlark';
const DATABASE = 'benchlark';
const IS_ROOT = process.getuid?.() === 0;

export class SetupError extends Error {}

function run(command, args, options = {}) {
  return spawnSync(command, args, { encoding: 'utf8', cwd: '/', ...options });
}

/** Runs a program as the user that owns the cluster. */
function runAsOwner(command, args, options = {}) {
  return IS_ROOT
    ? run('runuser', ['-u', 'postgres', '--', command, ...args], options)
    : run(command, args, options);
}

function must(result, what) {
  if (result.status !== 0) {
    throw new SetupError(
      `${what} failed: ${(result.stderr || result.stdout || String(result.error ?? '')).trim()}`,
    );
  }
  return result.stdout;
}

function clusterPaths(isTest) {
  const name = isTest ? 'test' : 'main';
  const tag = createHash('sha256').update(ROOT).digest('hex').slice(0, 10);
  const home = IS_ROOT
    ? `/var/lib/postgresql/benchlark-${tag}-${name}`
    : path.join(process.env.BENCHLARK_PG_DIR ?? path.join(ROOT, '.run', 'pg'), name);
  return { home, data: path.join(home, 'data'), log: path.join(home, 'server.log') };
}

function findBinaries() {
  const base = '/usr/lib/postgresql';
  if (!existsSync(base)) return null;
  return (
    readdirSync(base)
      .sort((a, b) => Number(b) - Number(a))
      .map((version) => path.join(base, version, 'bin'))
      .find((folder) => existsSync(path.join(folder, 'initdb')) && existsSync(path.join(folder, 'pg_ctl'))) ??
    null
  );
}

/** Installs Debian's PostgreSQL when it is missing; gives the folder of its programs. */
export function ensurePostgres() {
  const found = findBinaries();
  if (found) return found;
  if (!IS_ROOT) {
    throw new SetupError(
      'PostgreSQL is missing. As root: apt-get install -y --no-install-recommends postgresql (or set DATABASE_URL to a server of yours).',
    );
  }
  console.log('Installing PostgreSQL from Debian ...');
  const config = '/etc/postgresql-common/createcluster.conf';
  if (!existsSync(config)) {
    // Otherwise the package makes and starts a cluster of its own on 5432.
    mkdirSync(path.dirname(config), { recursive: true, mode: 0o755 });
    writeFileSync(config, 'create_main_cluster = false\n', { mode: 0o644 });
  }
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  must(run('apt-get', ['update', '-qq'], { env }), 'apt-get update');
  must(
    run('apt-get', ['install', '-y', '-qq', '--no-install-recommends', 'postgresql'], { env }),
    'apt-get install postgresql',
  );
  const bin = findBinaries();
  if (!bin)
    throw new SetupError('PostgreSQL was installed, but no server is to be found under /usr/lib/postgresql.');
  return bin;
}

function portIsFree(port) {
  return new Promise((resolve) => {
    const probe = createServer();
    probe.once('error', () => resolve(false));
    probe.listen(port, '127.0.0.1', () => probe.close(() => resolve(true)));
  });
}

export function findFreePort() {
  return new Promise((resolve, reject) => {
    const probe = createServer();
    probe.once('error', reject);
    probe.listen(0, '127.0.0.1', () => {
      const { port } = probe.address();
      probe.close(() => resolve(port));
    });
  });
}

function readPidFile(data) {
  const result = runAsOwner('cat', [path.join(data, 'postmaster.pid')]);
  if (result.status !== 0) return null;
  const lines = result.stdout.split('\n');
  return { pid: Number(lines[0]), port: Number(lines[3]) };
}

const sleep = (ms) => new Promise((resolve) => setTimeout(resolve, ms));

/**
 * Running means: the recorded process is a live postgres and accepts connections. A killed server may stay a zombie for
 * seconds, and after a restart of the machine its process id may be another program's: both look alive to pg_ctl.
 */
async function findRunning(bin, data) {
  for (let attempt = 0; attempt < 75; attempt++) {
    const file = readPidFile(data);
    if (!file || !existsSync(`/proc/${file.pid}/stat`)) return null;
    if (readFileSync(`/proc/${file.pid}/comm`, 'utf8').trim() !== 'postgres') {
      runAsOwner('rm', ['-f', path.join(data, 'postmaster.pid')]);
      return null;
    }
    const state = readFileSync(`/proc/${file.pid}/stat`, 'utf8').replace(/^.*\) /s, '')[0];
    const ready = run(path.join(bin, 'pg_isready'), ['-q', '-h', '127.0.0.1', '-p', String(file.port || 1)]);
    if (state !== 'Z' && ready.status === 0) return file;
    await sleep(200);
  }
  throw new SetupError(`The database server recorded in ${data} does not answer.`);
}

function makeCluster(bin, { home, data }) {
  if (runAsOwner('test', ['-e', path.join(data, 'PG_VERSION')]).status === 0) {
    const have = must(
      runAsOwner('cat', [path.join(data, 'PG_VERSION')]),
      'reading the cluster version',
    ).trim();
    const want = /(\d+)/.exec(must(run(path.join(bin, 'postgres'), ['--version']), 'postgres --version'))[1];
    if (have !== want) {
      throw new SetupError(
        `${data} was made by PostgreSQL ${have}, but the server here is ${want}. Upgrade it with pg_upgrade first.`,
      );
    }
    return;
  }
  if (IS_ROOT)
    must(
      run('install', ['-d', '-o', 'postgres', '-g', 'postgres', '-m', '700', home]),
      'making the data folder',
    );
  else mkdirSync(home, { recursive: true, mode: 0o700 });
  const fresh = path.join(home, 'data.new');
  const passwordFile = path.join(home, 'password');
  runAsOwner('rm', ['-rf', fresh]);
  must(
    runAsOwner('sh', ['-c', 'umask 077; cat >"$1"', 'sh', passwordFile], {
      input: randomBytes(24).toString('hex'),
    }),
    'writing the database password',
  );
  must(
    runAsOwner(path.join(bin, 'initdb'), [
      ...['-D', fresh, '-U', SUPERUSER, `--pwfile=${passwordFile}`, '--auth=scram-sha-256'],
      ...['-E', 'UTF8', '--locale=C.UTF-8', '--no-sync', '-k'],
    ]),
    'initdb',
  );
  must(runAsOwner('mv', [fresh, data]), 'moving the cluster into place');
}

async function launch(bin, { data, log }, isTest) {
  const options = ['listen_addresses=127.0.0.1', "unix_socket_directories=''", 'max_connections=200'];
  if (isTest) options.push('fsync=off', 'synchronous_commit=off', 'full_page_writes=off');
  const preferred = Number(process.env.PGPORT ?? 5432);
  let port = !isTest && (await portIsFree(preferred)) ? preferred : await findFreePort();
  for (let attempt = 1; ; attempt++) {
    const flags = [...options, `port=${port}`].map((option) => `-c ${option}`).join(' ');
    const result = runAsOwner(
      path.join(bin, 'pg_ctl'),
      ['-D', data, '-l', log, '-w', '-t', '60', '-o', flags, 'start'],
      {
        stdio: 'ignore',
      },
    );
    if (result.status === 0) return;
    if (attempt === 5) throw new SetupError(`PostgreSQL does not start; see ${log}.`);
    port = await findFreePort();
  }
}

/** Starts the cluster (making it first when missing) and gives its address. */
export async function startCluster({ isTest = false } = {}) {
  const bin = ensurePostgres();
  const paths = clusterPaths(isTest);
  makeCluster(bin, paths);
  let server = await findRunning(bin, paths.data);
  // A package upgrade under a running server breaks it: its libraries no longer match the program in memory.
  if (server && readlinkSync(`/proc/${server.pid}/exe`).endsWith('(deleted)')) {
    await stopCluster({ isTest });
    server = null;
  }
  if (!server) {
    await launch(bin, paths, isTest);
    server = await findRunning(bin, paths.data);
  }
  const password = must(
    runAsOwner('cat', [path.join(paths.home, 'password')]),
    'reading the database password',
  ).trim();
  const address = `${password}@127.0.0.1:${server.port}`;
  const adminUrl = `postgres://${SUPERUSER}:${address}/postgres`;
  const psql = (sql) => must(run(path.join(bin, 'psql'), ['-X', '-At', '-c', sql, adminUrl]), 'psql').trim();
  if (psql(`select 1 from pg_roles where rolname = '${USER}'`) !== '1') {
    psql(`create role "${USER}" login password '${password}'`);
  }
  if (psql(`select 1 from pg_database where datname = '${DATABASE}'`) !== '1') {
    psql(`create database "${DATABASE}" owner "${USER}"`);
  }
  return { adminUrl, url: `postgres://${USER}:${address}/${DATABASE}` };
}

export async function stopCluster({ isTest = false } = {}) {
  const bin = findBinaries();
  const { data } = clusterPaths(isTest);
  if (!bin || !(await findRunning(bin, data))) return;
  must(
    runAsOwner(path.join(bin, 'pg_ctl'), ['-D', data, '-m', 'fast', '-w', '-t', '60', 'stop'], {
      stdio: 'ignore',
    }),
    'pg_ctl stop',
  );
}

export async function destroyCluster({ isTest = false } = {}) {
  await stopCluster({ isTest });
  rmSync(clusterPaths(isTest).home, { recursive: true, force: true });
}

async function main([verb, ...flags]) {
  const options = { isTest: flags.includes('--test') };
  if (verb === 'start') console.log((await startCluster(options)).adminUrl);
  else if (verb === 'stop') await stopCluster(options);
  else if (verb === 'destroy') await destroyCluster(options);
  else if (verb === 'status') {
    const bin = findBinaries();
    const server = bin && (await findRunning(bin, clusterPaths(options.isTest).data));
    console.log(server ? `running on 127.0.0.1:${server.port}` : 'stopped');
    process.exitCode = server ? 0 : 1;
  } else {
    console.error('usage: node server/tools/postgres.mjs start|stop|status|destroy [--test]');
    process.exitCode = 2;
  }
}

if (process.argv[1] === fileURLToPath(import.meta.url)) {
  main(process.argv.slice(2)).catch((error) => {
    console.error(error instanceof SetupError ? error.message : error);
    process.exitCode = 1;
  });
}
