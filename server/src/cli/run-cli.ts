import { runAnalyse } from './analyse-command';
import { runImpedance, runPhono, runPower } from './bench-sums-command';
import { CliError, EXIT, type CliIo, type ExitCode } from './cli-io';
import { describeFailure } from './describe-failure';
import { HELP } from './help-text';
import { runInspect } from './inspect-command';
import { runPractice } from './practice-command';
import { runStimulus } from './stimulus-command';
import { runUpload } from './upload-command';
import { runVerify } from './verify-command';

type Command = (args: readonly string[], io: CliIo) => Promise<void | ExitCode>;

const COMMANDS: ReadonlyMap<string, Command> = new Map<string, Command>([
  ['analyse', runAnalyse],
  ['inspect', runInspect],
  ['verify', runVerify],
  ['stimulus', runStimulus],
  ['practice', runPractice],
  ['upload', runUpload],
  ['power', runPower],
  ['impedance', runImpedance],
  ['phono', runPhono],
]);

/** `--level -60`: a number after an option is its value, though it begins with a dash. */
function bindNegativeNumbers(args: readonly string[]): string[] {
  const bound: string[] = [];
  for (const word of args) {
    const last = bound[bound.length - 1];
    const isValue = /^-\.?\d/.test(word) && last !== undefined && /^--[a-z-]+$/.test(last);
    if (isValue) bound[bound.length - 1] = `${last}=${word}`;
    else bound.push(word);
  }
  return bound;
}

/** Options without a value. */
const SWITCHES: ReadonlySet<string> = new Set(['--json', '--bare', '--help', '--amendment', '--recorded']);

/** The file an error line names: the first word that is neither an option nor an option's value. */
function subjectOf(name: string, args: readonly string[]): string {
  const isOption = (word: string | undefined) => word?.startsWith('-') === true;
  const takesNext = (word: string | undefined) =>
    word !== undefined && isOption(word) && !word.includes('=') && !SWITCHES.has(word);
  return args.find((word, index) => !isOption(word) && !takesNext(args[index - 1])) ?? name;
}

/**
 * Runs one command of the command line.
 *
 * @param argv - words after the program's name
 * @returns the exit code; everything said has gone through `io`
 */
export async function runCli(argv: readonly string[], io: CliIo): Promise<ExitCode> {
  const [name, ...rest] = argv;
  const args = bindNegativeNumbers(rest);
  if (name === undefined || name === 'help' || name === '--help' || args.includes('--help')) {
    io.out(HELP);
    return name === undefined ? EXIT.wrongUsage : EXIT.done;
  }
  const command = COMMANDS.get(name);
  if (!command) {
    io.err(`benchlark: ${name}: is no command; there are ${[...COMMANDS.keys()].join(', ')} (see --help)\n`);
    return EXIT.wrongUsage;
  }
  try {
    return (await command(args, io)) ?? EXIT.done;
  } catch (error) {
    const failure = describeFailure(error);
    if (!failure) throw error;
    const namesFile = error instanceof CliError && error.namesFile;
    const subject = namesFile ? '' : `${subjectOf(name, args)}: `;
    io.err(`benchlark: ${subject}${failure.message}\n`);
    return failure.exitCode;
  }
}
