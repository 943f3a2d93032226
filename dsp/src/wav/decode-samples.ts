import { viewOf } from './little-endian.js';
import type { WavFormat } from './wav-file.js';

/**
 * Decodes one channel of interleaved frames.
 *
 * @param bytes - whole frames; not modified
 * @param firstByte - where the channel's first sample begins
 * @param blockAlign - bytes from frame to frame
 * @param out - takes as many samples as it is long
 */
type ChannelDecoder = (bytes: Uint8Array, firstByte: number, blockAlign: number, out: Float64Array) => void;

// One plain loop a format, so that each compiles to a load, a conversion and a multiplication. A DataView is as fast
// here as a typed array and asks neither for alignment nor for a byte order. Scales are powers of two: exact.

const decodeUnsigned8: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    out[n] = (bytes[at] - 128) * 2 ** -7;
  }
};

const decodeInteger16: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  const view = viewOf(bytes);
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    out[n] = view.getInt16(at, true) * 2 ** -15;
  }
};

const decodeInteger24: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    // Into the upper 24 of 32 bits, so that the sign comes by itself.
    out[n] = ((bytes[at] << 8) | (bytes[at + 1] << 16) | (bytes[at + 2] << 24)) * 2 ** -31;
  }
};

const decodeInteger32: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  const view = viewOf(bytes);
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    out[n] = view.getInt32(at, true) * 2 ** -31;
  }
};

const decodeFloat32: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  const view = viewOf(bytes);
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    out[n] = view.getFloat32(at, true);
  }
};

const decodeFloat64: ChannelDecoder = (bytes, firstByte, blockAlign, out) => {
  const view = viewOf(bytes);
  for (let n = 0, at = firstByte; n < out.length; n++, at += blockAlign) {
    out[n] = view.getFloat64(at, true);
  }
};

const INTEGER_DECODERS: Readonly<Record<number, ChannelDecoder>> = {
  8: decodeUnsigned8,
  16: decodeInteger16,
  24: decodeInteger24,
  32: decodeInteger32,
};

/**
 * Decodes whole interleaved frames. An integer sample is exactly value / 2^(bits - 1): -1 to 1 - 2^-(bits - 1). Where
 * fewer bits are valid than the container holds they are its upper ones, so that value / 2^(containerBits - 1) is the
 * same number. 8 bits are offset binary, 128 = 0. Float is taken as it stands, beyond ±1 as well.
 *
 * @param bytes - whole frames; not modified
 * @param format - as `readFormat` accepted it
 * @param channels - one array a channel, written from `fromFrame` on
 * @param fromFrame - where in these arrays the first frame goes
 * @see Microsoft and IBM, "Multimedia Programming Interface and Data Specifications 1.0" (1991), data format of PCM
 */
export function decodeSamples(
  bytes: Uint8Array,
  format: WavFormat,
  channels: readonly Float64Array[],
  fromFrame: number,
): void {
  const { blockAlign, containerBits } = format;
  const ofFloat = containerBits === 64 ? decodeFloat64 : decodeFloat32;
  const decode = format.sampleFormat === 'float' ? ofFloat : INTEGER_DECODERS[containerBits];
  const frameCount = Math.floor(bytes.length / blockAlign);
  for (let index = 0; index < channels.length; index++) {
    const out = channels[index].subarray(fromFrame, fromFrame + frameCount);
    decode(bytes, (index * containerBits) / 8, blockAlign, out);
  }
}
