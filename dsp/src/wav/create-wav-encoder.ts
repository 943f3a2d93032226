import { DspInputError } from '../errors.js';
import type { SampleSource } from '../source/sample-source.js';
import { createSampleEncoder, type SampleEncoding } from './encode-samples.js';
import type { BroadcastExtensionInput } from './write-broadcast-extension.js';
import { writeWavHeader } from './write-wav-header.js';

export interface WavEncoderOptions extends SampleEncoding {
  readonly sampleRateHz: number;
  readonly channelCount: number;
  /** All frames that will come; the header states them. */
  readonly frameCount: number;
  readonly channelMask?: number;
  readonly broadcast?: BroadcastExtensionInput;
}

/** What is known without being said when the samples are there already. */
export type WavOptions = Omit<WavEncoderOptions, 'sampleRateHz' | 'channelCount' | 'frameCount'>;

/** Writes a WAV file piece by piece: the header first, then blocks until `framesLeft` is 0. */
export interface WavEncoder {
  /** Of the whole file. */
  readonly sizeBytes: number;
  readonly framesLeft: number;
  /** Samples that lay beyond full scale and were set to it, so far. */
  readonly saturatedCount: number;
  header(): Uint8Array;
  /**
   * @param channels - the next frames, one array a channel; linear, ±1.0 = full scale; not modified
   * @returns their bytes, with the pad byte that ends an odd data chunk when they are the last
   * @throws DspInputError `BAD_ARGUMENT` when more come than were announced; `NON_FINITE_SAMPLE`
   */
  block(channels: readonly Float64Array[]): Uint8Array;
}

/**
 * Makes a writer of one WAV file that needs no more memory than a block.
 *
 * @throws DspInputError `BAD_ARGUMENT` for an option out of its range
 *
 * @example
 * const encoder = createWavEncoder({
 *   sampleRateHz: 48_000, channelCount: 1, frameCount: 2, bits: 24, dither: 'none', seed: 0,
 * });
 * encoder.block([Float64Array.of(0.5, -0.5)]); // 00 00 40 00 00 c0
 */
export function createWavEncoder(options: WavEncoderOptions): WavEncoder {
  const { channelCount, frameCount, bits } = options;
  const samples = createSampleEncoder(channelCount, options);
  const { bytesPerSample } = samples;
  const header = writeWavHeader({ ...options, bytesPerSample, isFloat: bits === '32f' });
  const dataBytes = frameCount * channelCount * bytesPerSample;
  let framesLeft = frameCount;
  return {
    sizeBytes: header.length + dataBytes + (dataBytes % 2),
    get framesLeft() {
      return framesLeft;
    },
    get saturatedCount() {
      return samples.saturatedCount;
    },
    header: () => header.slice(),
    block: (channels) => {
      const count = channels[0]?.length ?? 0;
      if (count > framesLeft) {
        throw new DspInputError('BAD_ARGUMENT', `${count} frames came where ${framesLeft} are left to write`);
      }
      const bytes = samples.encode(channels);
      framesLeft -= count;
      if (framesLeft > 0 || dataBytes % 2 === 0 || count === 0) {
        return bytes;
      }
      const padded = new Uint8Array(bytes.length + 1);
      padded.set(bytes);
      return padded;
    },
  };
}

const BLOCK_FRAMES = 65_536;

/**
 * Writes a source as a WAV file, block by block.
 *
 * @param source - read once, from its first frame to its last
 * @returns the file's bytes in order, the header first
 * @throws DspInputError as `createWavEncoder` and the source do
 */
export async function* encodeWavBlocks(
  source: SampleSource,
  options: WavOptions,
): AsyncGenerator<Uint8Array> {
  const { sampleRateHz, channelCount, frameCount } = source;
  const encoder = createWavEncoder({ ...options, sampleRateHz, channelCount, frameCount });
  yield encoder.header();
  for (let frame = 0; frame < frameCount; frame += BLOCK_FRAMES) {
    yield encoder.block(await source.read(frame, BLOCK_FRAMES));
  }
}

/**
 * Writes samples in memory as a whole WAV file.
 *
 * @param channels - one array a channel, all of one length, at least one frame; linear, ±1.0 = full scale; not modified
 * @returns the file
 * @throws DspInputError `BAD_ARGUMENT`, `NON_FINITE_SAMPLE`
 */
export function encodeWav(
  channels: readonly Float64Array[],
  options: WavOptions & { readonly sampleRateHz: number },
): Uint8Array {
  const frameCount = channels[0]?.length ?? 0;
  const encoder = createWavEncoder({ ...options, channelCount: channels.length, frameCount });
  const file = new Uint8Array(encoder.sizeBytes);
  const header = encoder.header();
  file.set(header);
  file.set(encoder.block(channels), header.length);
  return file;
}
