import { openAsBlob } from 'node:fs';
import { stat } from 'node:fs/promises';
import path from 'node:path';
import { CliError, EXIT, type CliIo, type ExitCode } from './cli-io';
import { describeFailure } from './describe-failure';
import { parseCommand, readText } from './parse-command';

interface Problem {
  readonly title?: string;
  readonly detail?: string;
  readonly code?: string;
  readonly offset?: number;
  readonly remedy?: string;
}

interface Archived {
  readonly id: string;
  readonly number: number;
  readonly sameBytesAs: readonly { readonly number: number }[];
}

interface Target {
  readonly url: URL;
  readonly token: string;
}

function isConnectionLost(error: unknown): boolean {
  const cause = (error as { cause?: { code?: string } }).cause;
  return ['ECONNRESET', 'EPIPE', 'UND_ERR_SOCKET'].includes(cause?.code ?? '');
}

async function send(file: string, shownName: string, { url, token }: Target): Promise<Response> {
  const form = new FormData();
  form.append('file', await openAsBlob(file), path.basename(shownName));
  return fetch(new URL('/api/captures', url), {
    method: 'POST',
    body: form,
    headers: { authorization: `Bearer ${token}` },
  });
}

async function sendTwiceAtMost(file: string, shownName: string, target: Target): Promise<Response> {
  try {
    return await send(file, shownName, target);
  } catch (error) {
    if (!isConnectionLost(error)) throw error;
    return send(file, shownName, target);
  }
}

async function uploadFile(shownName: string, io: CliIo, target: Target): Promise<void> {
  const file = path.resolve(io.cwd, shownName);
  await stat(file);
  let answer: Response;
  try {
    answer = await sendTwiceAtMost(file, shownName, target);
  } catch (error) {
    const cause = (error as { cause?: { message?: string } }).cause?.message ?? (error as Error).message;
    throw new CliError(EXIT.unreadable, `${target.url.origin} can't be reached: ${cause}`);
  }
  if (answer.status !== 201) {
    const problem = (await answer.json().catch(() => ({}))) as Problem;
    const place = problem.offset === undefined ? '' : ` (byte ${problem.offset})`;
    const words = [problem.detail ?? problem.title ?? 'refused', problem.remedy].filter(Boolean).join('. ');
    throw new CliError(EXIT.unreadable, `${answer.status} ${problem.code ?? ''}: ${words}${place}`);
  }
  const capture = (await answer.json()) as Archived;
  const same = capture.sameBytesAs.map(({ number }) => number);
  const note = same.length > 0 ? `, the same bytes as capture ${same.join(', ')}` : '';
  io.out(
    `${shownName}: capture ${capture.number}${note}: ${new URL(`/captures/${capture.id}`, target.url).href}\n`,
  );
}

/** `upload FILE.wav... --to URL --token T`: archives recordings; goes on after a refused one. */
export async function runUpload(args: readonly string[], io: CliIo): Promise<ExitCode> {
  const command = parseCommand(args, { to: { type: 'string' }, token: { type: 'string' } });
  const [to, token] = [readText(command, 'to'), readText(command, 'token')];
  if (command.positionals.length === 0 || to === undefined || token === undefined) {
    throw new CliError(EXIT.wrongUsage, 'upload takes FILE.wav... --to URL --token T');
  }
  if (!URL.canParse(to))
    throw new CliError(EXIT.wrongUsage, `--to takes an address, as http://127.0.0.1:4870, not "${to}"`);
  let hasFailed = false;
  for (const shownName of command.positionals) {
    if (io.isWatched) io.err(`${shownName}: sending\n`);
    try {
      await uploadFile(shownName, io, { url: new URL(to), token });
    } catch (error) {
      const failure = describeFailure(error);
      if (!failure) throw error;
      hasFailed = true;
      io.err(`benchlark: ${shownName}: ${failure.message}\n`);
    }
  }
  return hasFailed ? EXIT.unreadable : EXIT.done;
}
