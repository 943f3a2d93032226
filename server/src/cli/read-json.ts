import { readFile } from 'node:fs/promises';
import { CliError, EXIT } from './cli-io';

/** Reads a JSON file named on the command line. */
export async function readJson(path: string, shownName: string): Promise<unknown> {
  let text: string;
  try {
    text = await readFile(path, 'utf8');
  } catch (error) {
    throw new CliError(EXIT.unreadable, `${shownName}: ${describeFileError(error)}`);
  }
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    throw new CliError(EXIT.unreadable, `${shownName}: is not JSON: ${(error as SyntaxError).message}`);
  }
}

const FILE_ERRORS: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file',
  EISDIR: 'is a folder, not a file',
  EACCES: 'may not be read: permission denied',
  ENOSPC: 'could not be written: the disk is full',
  EROFS: 'could not be written: the disk is read-only',
};

export function describeFileError(error: unknown): string {
  const { code, message } = error as NodeJS.ErrnoException;
  return (code && FILE_ERRORS[code]) ?? message;
}
