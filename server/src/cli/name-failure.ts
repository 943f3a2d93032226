import { CliError } from './cli-io';
import { describeFailure } from './describe-failure';

/** Does a piece of work on one file; if it fails, the error line names that file. */
export async function namingFile<T>(shownName: string, work: () => T | Promise<T>): Promise<T> {
  try {
    return await work();
  } catch (error) {
    const failure = error instanceof CliError ? null : describeFailure(error);
    if (!failure) throw error;
    throw new CliError(failure.exitCode, `${shownName}: ${failure.message}`, true);
  }
}
