/**
 * Where samples come from: a file, a Blob, or memory. Every measure reads through this alone, so that none needs the
 * whole capture in memory.
 */
export interface SampleSource {
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Whole frames present. */
  readonly frameCount: number;
  /**
   * Reads a run of frames.
   *
   * @param fromFrame - first frame, 0 ≤ fromFrame ≤ frameCount
   * @param count - frames wanted; fewer come back only at the end
   * @returns one array a channel, linear, ±1.0 = digital full scale; the caller may keep and change them
   * @throws DspInputError `NON_FINITE_SAMPLE` at the first NaN or ±Infinity
   */
  read(fromFrame: number, count: number): Promise<Float64Array[]>;
}

export type SampleFormat = 'integer' | 'float';

/** What a capture is, as its record states it. */
export interface CaptureFacts {
  /** Hex SHA-256 of the file's bytes. */
  readonly sha256: string;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Valid bits a sample (24 in a 32-bit container stays 24). */
  readonly bitsPerSample: number;
  readonly sampleFormat: SampleFormat;
  readonly frameCount: number;
  readonly durationS: number;
  /** Present and true where the file itself says that a practice device was recorded. */
  readonly isPractice?: true;
}
