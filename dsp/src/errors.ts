/** Every way in which input can be refused; a caller branches on these, never on a message. */
export const DSP_ERROR_CODES = [
  // the file
  'WAV_EMPTY_FILE',
  'WAV_NOT_RIFF',
  'WAV_OTHER_CONTAINER',
  'WAV_TRUNCATED_HEADER',
  'WAV_FORMAT_MISSING',
  'WAV_FORMAT_CONTRADICTORY',
  'WAV_COMPRESSED',
  'WAV_BAD_SAMPLE_RATE',
  'WAV_BAD_CHANNEL_COUNT',
  'WAV_BAD_BIT_DEPTH',
  'WAV_BAD_BLOCK_ALIGN',
  'WAV_DATA_MISSING',
  'WAV_DATA_EMPTY',
  'WAV_TOO_MANY_CHUNKS',
  'WAV_CHANGED_WHILE_READ',
  'NON_FINITE_SAMPLE',
  // the call
  'EMPTY_SIGNAL',
  'BAD_ARGUMENT',
  'OUT_OF_RANGE',
  'BAD_DESCRIPTOR',
  'BAD_DEVICE',
  'BAD_CALIBRATION',
  'BAD_RECORD',
  'UNKNOWN_NAME',
  // the analysis
  'SEGMENT_TOO_SHORT',
  'NOTHING_MEASURABLE',
  'NOT_RECOGNISED',
  'CANCELLED',
] as const;
export type DspErrorCode = (typeof DSP_ERROR_CODES)[number];

export interface DspErrorDetails {
  /** Byte offset in the file at which the fault stands. */
  readonly offset?: number;
  /** What stood there, in words. */
  readonly found?: string;
  /** What a person can do about it. */
  readonly remedy?: string;
}

/** The only error that dsp throws on purpose: a broken precondition or an input that can't be measured. */
export class DspInputError extends Error {
  override readonly name = 'DspInputError';

  constructor(
    readonly code: DspErrorCode,
    message: string,
    readonly details: DspErrorDetails = {},
  ) {
    super(message);
  }
}
