import { DspInputError, type DspErrorCode } from '../errors.js';

export interface WavFault {
  /** What is wrong, without the place: it comes behind. */
  readonly what: string;
  readonly offset: number;
  readonly found: string;
  readonly remedy: string;
}

/**
 * Makes the error of a file that can't be measured. Its message is one line that says what is wrong, where, and what
 * stood there; what to do about it is in `details.remedy`.
 */
export function refuseWav(code: DspErrorCode, fault: WavFault): DspInputError {
  const { what, offset, found, remedy } = fault;
  return new DspInputError(code, `${what} (byte ${offset}: ${found})`, { offset, found, remedy });
}
