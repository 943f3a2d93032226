import { parseArgs, type ParseArgsConfig } from 'node:util';
import { CliError, EXIT } from './cli-io';

export type OptionSpecs = NonNullable<ParseArgsConfig['options']>;

export interface ParsedCommand {
  readonly values: Readonly<Record<string, string | boolean | undefined>>;
  readonly positionals: readonly string[];
}

/** Splits a command's words into options and files; says what is wrong with them in one line. */
export function parseCommand(args: readonly string[], options: OptionSpecs): ParsedCommand {
  try {
    const { values, positionals } = parseArgs({
      args: [...args],
      options: { ...options, help: { type: 'boolean' } },
      allowPositionals: true,
      strict: true,
    });
    return { values: values, positionals };
  } catch (error) {
    throw new CliError(EXIT.wrongUsage, (error as Error).message.replaceAll(/\s+/g, ' '));
  }
}

export function readText(command: ParsedCommand, name: string): string | undefined {
  const value = command.values[name];
  return typeof value === 'string' ? value : undefined;
}

export function readNumber(command: ParsedCommand, name: string): number | undefined {
  const text = readText(command, name);
  if (text === undefined) return undefined;
  const value = Number(text.replace('\u2212', '-'));
  if (text.trim() === '' || !Number.isFinite(value)) {
    throw new CliError(EXIT.wrongUsage, `--${name} takes a number, not "${text}"`);
  }
  return value;
}

export function readChoice<T extends string>(
  command: ParsedCommand,
  name: string,
  choices: readonly T[],
): T | undefined {
  const text = readText(command, name);
  if (text === undefined) return undefined;
  const choice = choices.find((candidate) => candidate === text);
  if (choice === undefined) {
    throw new CliError(EXIT.wrongUsage, `--${name} takes ${choices.join(', ')}, not "${text}"`);
  }
  return choice;
}

/** Reads `LOW:HIGH` in Hz. */
export function readBand(
  command: ParsedCommand,
): { readonly bandLowHz: number; readonly bandHighHz: number } | Record<never, never> {
  const text = readText(command, 'band');
  if (text === undefined) return {};
  const match = /^(\d+(?:\.\d+)?):(\d+(?:\.\d+)?)$/.exec(text);
  const [bandLowHz, bandHighHz] = [Number(match?.[1]), Number(match?.[2])];
  if (!match || !(bandLowHz < bandHighHz)) {
    throw new CliError(EXIT.wrongUsage, `--band takes LOW:HIGH in Hz, as 20:20000, not "${text}"`);
  }
  return { bandLowHz, bandHighHz };
}

export function takeOne(command: ParsedCommand, what: string): string {
  const [first, ...rest] = command.positionals;
  if (first === undefined) throw new CliError(EXIT.wrongUsage, `${what} is missing`);
  if (rest.length > 0) throw new CliError(EXIT.wrongUsage, `takes one file, but also got "${rest[0]}"`);
  return first;
}
