import { types } from 'node:util';
import { DspInputError, type DspErrorCode } from '@benchlark/dsp';
import { CliError, EXIT, type ExitCode } from './cli-io';
import { describeFileError } from './read-json';

const NOTHING_MEASURABLE: ReadonlySet<DspErrorCode> = new Set([
  'NOTHING_MEASURABLE',
  'NOT_RECOGNISED',
  'SEGMENT_TOO_SHORT',
]);
const WRONG_USAGE: ReadonlySet<DspErrorCode> = new Set(['BAD_ARGUMENT', 'OUT_OF_RANGE', 'UNKNOWN_NAME']);

export interface Failure {
  readonly exitCode: ExitCode;
  readonly code: string;
  /** What is wrong and where, on one line. */
  readonly message: string;
  readonly offset: number | null;
}

function exitCodeOf(code: DspErrorCode): ExitCode {
  if (NOTHING_MEASURABLE.has(code)) return EXIT.nothingMeasurable;
  return WRONG_USAGE.has(code) ? EXIT.wrongUsage : EXIT.unreadable;
}

/** Words for what went wrong with one file; null for a fault of ours, which must not be dressed up. */
export function describeFailure(error: unknown): Failure | null {
  if (error instanceof CliError) {
    return { exitCode: error.exitCode, code: 'FILE_ERROR', message: error.message, offset: null };
  }
  if (error instanceof DspInputError) {
    const { remedy, offset } = error.details;
    const message = [error.message, remedy].filter(Boolean).join('. ').replaceAll(/\s+/g, ' ');
    return { exitCode: exitCodeOf(error.code), code: error.code, message, offset: offset ?? null };
  }
  if (types.isNativeError(error) && 'syscall' in error) {
    return { exitCode: EXIT.unreadable, code: 'FILE_ERROR', message: describeFileError(error), offset: null };
  }
  return null;
}
