/** The command line's border with the world, so that tests can stand on the other side. */
export interface CliIo {
  /** What relative paths start from. */
  readonly cwd: string;
  out(text: string): void;
  err(text: string): void;
  /** True where a person watches standard error, so that progress may be shown there. */
  readonly isWatched: boolean;
}

export const EXIT = {
  done: 0,
  wrongUsage: 2,
  unreadable: 3,
  nothingMeasurable: 4,
  disagrees: 5,
} as const;
export type ExitCode = (typeof EXIT)[keyof typeof EXIT];

/** Ends the command with one line on standard error. */
export class CliError extends Error {
  override readonly name = 'CliError';

  constructor(
    readonly exitCode: ExitCode,
    message: string,
    /** Whether the message begins with the file it is about. */
    readonly namesFile = exitCode !== EXIT.wrongUsage,
  ) {
    super(message);
  }
}
