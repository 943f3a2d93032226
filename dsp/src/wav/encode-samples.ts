import { DspInputError } from '../errors.js';
import { createRandom, drawTriangular, type Random } from '../random/create-random.js';
import { channelName } from '../source/channel-name.js';
import { findNonFinite } from '../source/find-non-finite.js';
import type { FrameRun } from '../source/frame-run.js';
import type { StimulusBits } from '../stimulus/descriptor.js';
import { viewOf } from './little-endian.js';

export type WavDither = 'tpdf' | 'none';

/** How samples are to stand in the file. */
export interface SampleEncoding {
  readonly bits: StimulusBits;
  /** Applies to 16 and 24 bits; float needs none. */
  readonly dither: WavDither;
  /** Whole number, 0 to 2^32 - 1; channel c draws from a generator of its own, seeded with seed + c. */
  readonly seed: number;
  /** Runs of frames that are written as they stand, in order of time; the dither around them stays the same. */
  readonly undithered?: readonly FrameRun[];
}

/** Turns blocks of samples into bytes, one after the other. */
export interface SampleEncoder {
  readonly bytesPerSample: number;
  /** Samples that lay beyond the largest or smallest code and were set to it, so far. */
  readonly saturatedCount: number;
  /**
   * @param channels - one array a channel, of one length; linear, ±1.0 = full scale; not modified
   * @returns interleaved frames
   * @throws DspInputError `NON_FINITE_SAMPLE` at a NaN or ±Infinity, which no WAV file of ours shall hold
   */
  encode(channels: readonly Float64Array[]): Uint8Array;
}

const BYTES: Readonly<Record<StimulusBits, number>> = { 16: 2, 24: 3, '32f': 4 };

function checkChannels(channels: readonly Float64Array[], channelCount: number): void {
  if (channels.length !== channelCount || channels.some(({ length }) => length !== channels[0].length)) {
    const lengths = channels.map(({ length }) => length).join(', ');
    throw new DspInputError(
      'BAD_ARGUMENT',
      `${channelCount} channels of one length are needed, not: ${lengths}`,
    );
  }
  channels.forEach((samples, index) => {
    const frame = findNonFinite(samples);
    if (frame >= 0) {
      const what = `sample ${frame} of the block of the channel ${channelName(index)} is ${samples[frame]}`;
      throw new DspInputError('NON_FINITE_SAMPLE', what);
    }
  });
}

/**
 * Makes an encoder. Integers are floor(x · 2^(bits - 1) + d + 0.5), limited to the codes there are; d is triangular
 * dither of ±1 LSB, independent from channel to channel, or 0. The same seed gives the same bytes however the samples
 * are cut into blocks.
 *
 * @throws DspInputError `BAD_ARGUMENT` for a seed that is no whole number from 0 to 2^32 - 1
 * @see Lipshitz, Wannamaker and Vanderkooy, "Quantization and Dither: A Theoretical Survey", JAES 40(5), 1992
 */
export function createSampleEncoder(channelCount: number, encoding: SampleEncoding): SampleEncoder {
  const { bits, dither, seed, undithered = [] } = encoding;
  if (!Number.isInteger(seed) || seed < 0 || seed > 0xffffffff) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `the seed must be a whole number from 0 to 2^32 - 1, not ${seed}`,
    );
  }
  const bytesPerSample = BYTES[bits];
  const scale = bits === '32f' ? 1 : 2 ** (bits - 1);
  const draws: Random[] = Array.from({ length: channelCount }, (_, index) => {
    const random = createRandom((seed + index) >>> 0);
    return dither === 'tpdf' ? () => drawTriangular(random) : () => 0;
  });
  let saturatedCount = 0;
  let framesDone = 0;

  const isExact = (frame: number): boolean => undithered.some(({ from, to }) => frame >= from && frame < to);
  const toCode = (sample: number, dithering: number): number => {
    const code = Math.floor(sample * scale + dithering + 0.5);
    if (code >= -scale && code < scale) {
      return code;
    }
    saturatedCount++;
    return code < 0 ? -scale : scale - 1;
  };
  const put = (view: DataView, at: number, sample: number, dithering: number): void => {
    if (bits === '32f') {
      view.setFloat32(at, sample, true);
    } else if (bits === 16) {
      view.setInt16(at, toCode(sample, dithering), true);
    } else {
      const code = toCode(sample, dithering);
      view.setUint16(at, code & 0xffff, true);
      view.setInt8(at + 2, code >> 16);
    }
  };

  return {
    bytesPerSample,
    get saturatedCount() {
      return saturatedCount;
    },
    encode: (channels) => {
      checkChannels(channels, channelCount);
      const blockAlign = channelCount * bytesPerSample;
      const bytes = new Uint8Array(channels[0].length * blockAlign);
      const view = viewOf(bytes);
      channels.forEach((samples, index) => {
        for (let n = 0, at = index * bytesPerSample; n < samples.length; n++, at += blockAlign) {
          const drawn = draws[index]();
          put(view, at, samples[n], undithered.length > 0 && isExact(framesDone + n) ? 0 : drawn);
        }
      });
      framesDone += channels[0].length;
      return bytes;
    },
  };
}
