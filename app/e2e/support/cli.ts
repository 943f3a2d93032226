import { execFile } from 'node:child_process';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const MAIN = fileURLToPath(new URL('../../../server/dist/cli/main.js', import.meta.url));

export interface CliResult {
  readonly code: number;
  readonly stdout: string;
  readonly stderr: string;
}

/** Runs the built command line as a process of its own. */
export function runCli(...args: string[]): Promise<CliResult> {
  return new Promise((resolve) => {
    const options = { maxBuffer: 64 * 1024 * 1024, cwd: path.dirname(MAIN) };
    execFile(process.execPath, [MAIN, ...args], options, (error, stdout, stderr) => {
      resolve({ code: typeof error?.code === 'number' ? error.code : error ? 1 : 0, stdout, stderr });
    });
  });
}
