import { spawn, type ChildProcess } from 'node:child_process';
import { once } from 'node:events';
import { existsSync } from 'node:fs';
import { resolve } from 'node:path';
import type { Bench } from './bench';

const WORKER_FILE = resolve(__dirname, '../../dist/worker.js');
const START_MS = 20_000;

export interface WorkerProcess {
  readonly child: ChildProcess;
  /** Everything it has written so far. */
  output(): string;
  /** Ends it and waits until it is gone; tells how it ended. */
  end(signal?: NodeJS.Signals): Promise<{ code: number | null; signal: NodeJS.Signals | null }>;
}

/** Starts the built worker on the bench's database and store; resolves once it takes jobs. */
export async function startWorker(bench: Bench, env: Record<string, string> = {}): Promise<WorkerProcess> {
  if (!existsSync(WORKER_FILE)) throw new Error('build the server first: npm run build');
  const child = spawn(process.execPath, [WORKER_FILE], {
    stdio: ['ignore', 'pipe', 'pipe'],
    env: {
      PATH: process.env['PATH'],
      NODE_ENV: 'test',
      DATABASE_URL: bench.database.url,
      STORE_DIR: bench.storeDir,
      SESSION_SECRET: 'a-secret-that-only-the-tests-know-0123456789',
      LOG_LEVEL: 'warn',
      WORKER_CONCURRENCY: '1',
      WORKER_HEARTBEAT_MS: '500',
      WORKER_SILENT_MS: '2000',
      ...env,
    },
  });
  let output = '';
  child.stdout.on('data', (chunk: Buffer) => (output += chunk.toString('utf8')));
  child.stderr.on('data', (chunk: Buffer) => (output += chunk.toString('utf8')));
  const ended = once(child, 'exit') as Promise<[number | null, NodeJS.Signals | null]>;
  const deadline = Date.now() + START_MS;
  while (!output.includes('worker is ready')) {
    if (child.exitCode !== null || Date.now() > deadline) {
      child.kill('SIGKILL');
      throw new Error(`the worker did not start: ${output}`);
    }
    await new Promise((resolve) => setTimeout(resolve, 50));
  }
  return {
    child,
    output: () => output,
    end: async (signal = 'SIGTERM') => {
      child.kill(signal);
      const [code, by] = await ended;
      return { code, signal: by };
    },
  };
}
