// What the project's scripts share: paths, running programs, and knowing what has changed since the last time.
import { spawn, spawnSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { existsSync, mkdirSync, readFileSync, readdirSync, statSync, writeFileSync } from 'node:fs';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

export const ROOT = path.resolve(path.dirname(fileURLToPath(import.meta.url)), '../..');
export const RUN_DIR = path.join(ROOT, '.run');

const NOT_SOURCES = new Set(['node_modules', 'dist', 'dist-types', 'docs']);

function* listFiles(target) {
  if (!existsSync(target)) return;
  if (!statSync(target).isDirectory()) {
    yield target;
    return;
  }
  for (const entry of readdirSync(target, { withFileTypes: true }).sort((a, b) =>
    a.name < b.name ? -1 : 1,
  )) {
    if (NOT_SOURCES.has(entry.name)) continue;
    yield* listFiles(path.join(target, entry.name));
  }
}

/** Hashes the names and contents of files and folders below the project's root. */
export function hashOf(targets) {
  const hash = createHash('sha256');
  for (const target of targets) {
    for (const file of listFiles(path.join(ROOT, target))) {
      hash.update(path.relative(ROOT, file)).update('\0').update(readFileSync(file)).update('\0');
    }
  }
  return hash.digest('hex');
}

/** Runs `work` unless it was done before with the same inputs and its result is still there. */
export async function onceFor(stampFile, inputs, result, work) {
  const wanted = hashOf(inputs);
  const isDone = existsSync(result) && existsSync(stampFile) && readFileSync(stampFile, 'utf8') === wanted;
  if (isDone) return false;
  await work();
  mkdirSync(path.dirname(stampFile), { recursive: true });
  writeFileSync(stampFile, wanted);
  return true;
}

/** Runs a program in the project's root with its output shown; throws when it fails. */
export function runShown(command, args, options = {}) {
  const result = spawnSync(command, args, { cwd: ROOT, stdio: 'inherit', ...options });
  if (result.error) throw result.error;
  if (result.status !== 0)
    throw new Error(`${command} ${args.join(' ')} ended with ${result.status ?? result.signal}`);
}

/** Installs Debian packages unless the shell command `check` succeeds. Only root can. */
export function ensureDebian(check, packages, purpose) {
  const isThere = () => spawnSync('sh', ['-c', check], { stdio: 'ignore' }).status === 0;
  if (isThere()) return;
  const command = `apt-get install -y --no-install-recommends ${packages.join(' ')}`;
  if (process.getuid?.() !== 0)
    throw new Error(`${purpose} needs ${packages.join(', ')}. As root: ${command}`);
  console.log(`Installing ${packages.join(', ')} from Debian (${purpose}) ...`);
  const env = { ...process.env, DEBIAN_FRONTEND: 'noninteractive' };
  runShown('apt-get', ['update', '-qq'], { env });
  runShown('apt-get', ['install', '-y', '-qq', '--no-install-recommends', ...packages], {
    env,
    stdio: ['ignore', 'ignore', 'inherit'],
  });
  if (!isThere()) throw new Error(`${packages.join(', ')} was installed, but "${check}" still fails`);
}

/** Starts a long-running process of the project; `onEnd` hears its exit code. */
export function startProcess(command, args, { env, onEnd, ...options }) {
  const child = spawn(command, args, {
    cwd: ROOT,
    stdio: 'inherit',
    env: { ...process.env, ...env },
    ...options,
  });
  child.once('exit', (code, signal) => onEnd(code ?? (signal ? 1 : 0)));
  return child;
}
