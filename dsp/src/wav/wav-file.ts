import type { Warning } from '../record/record.js';
import type { CaptureFacts, SampleFormat, SampleSource } from '../source/sample-source.js';
import type { BroadcastExtension } from './broadcast-extension.js';

/** RIFF as Microsoft and IBM define it, RF64 (EBU Tech 3306) and BW64 (ITU-R BS.2088) for more than 4 GB. */
export type WavContainer = 'RIFF' | 'RF64' | 'BW64';

/** How one sample stands in the file. */
export interface WavFormat {
  readonly sampleFormat: SampleFormat;
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** Bits that carry the sample; they are the upper ones of the container. */
  readonly bitsPerSample: number;
  /** Bits a sample takes in the file: 8, 16, 24, 32 or 64. */
  readonly containerBits: number;
  /** Bytes a frame takes: channels × containerBits / 8. */
  readonly blockAlign: number;
  /** True when the fmt chunk is WAVE_FORMAT_EXTENSIBLE. */
  readonly isExtensible: boolean;
  /** Speaker places, one bit each; null where the fmt chunk can't say. 0 assigns none. */
  readonly channelMask: number | null;
}

/** A chunk that was met on the way through the file. */
export interface WavChunk {
  /** Four letters, as they stand. */
  readonly id: string;
  /** Where its content begins; its head is the 8 bytes before. */
  readonly offset: number;
  /** Bytes of content that are in the file. */
  readonly sizeBytes: number;
}

/** An opened WAV file: its samples through `read`, and what its header says. */
export interface WavFile extends SampleSource {
  readonly container: WavContainer;
  readonly format: WavFormat;
  /** Where the first frame begins. */
  readonly dataOffset: number;
  /** Bytes of whole frames: frameCount × blockAlign. */
  readonly dataSizeBytes: number;
  readonly chunks: readonly WavChunk[];
  readonly broadcast: BroadcastExtension | null;
  /** What is odd about the file and was overcome. */
  readonly warnings: readonly Warning[];
}

/** How the `bext` description of a recording of a practice device begins. */
export const PRACTICE_DESCRIPTION = 'Practice take, no real unit.';

/**
 * States what a capture is, as its record does.
 *
 * @param wav - an opened file
 * @param sha256 - hex SHA-256 of the whole file, from whoever can hash
 */
export function captureFactsOf(wav: WavFile, sha256: string): CaptureFacts {
  return {
    sha256,
    sampleRateHz: wav.sampleRateHz,
    channelCount: wav.channelCount,
    bitsPerSample: wav.format.bitsPerSample,
    sampleFormat: wav.format.sampleFormat,
    frameCount: wav.frameCount,
    durationS: wav.frameCount / wav.sampleRateHz,
    ...(wav.broadcast?.description.startsWith(PRACTICE_DESCRIPTION) === true ? { isPractice: true } : {}),
  };
}
