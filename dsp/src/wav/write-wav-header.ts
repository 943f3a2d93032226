import { DspInputError } from '../errors.js';
import { putText, viewOf } from './little-endian.js';
import { FORMAT_TAG_EXTENSIBLE, FORMAT_TAG_FLOAT, FORMAT_TAG_PCM } from './name-format-tag.js';
import { HIGHEST_RATE_HZ, LOWEST_RATE_HZ, MOST_CHANNELS } from './read-format.js';
import { SIZE_ELSEWHERE } from './read-sizes.js';
import { type BroadcastExtensionInput, writeBroadcastExtension } from './write-broadcast-extension.js';

/** What a header states. */
export interface WavHeaderFields {
  /** Whole Hz, 1 kHz to 1.536 MHz. */
  readonly sampleRateHz: number;
  readonly channelCount: number;
  readonly frameCount: number;
  readonly bytesPerSample: number;
  readonly isFloat: boolean;
  /** Speaker places where there are more than two channels; 0, the default, assigns none. */
  readonly channelMask?: number;
  readonly broadcast?: BroadcastExtensionInput;
}

const chunk = (id: string, content: Uint8Array, declaredBytes = content.length): Uint8Array => {
  const bytes = new Uint8Array(8 + content.length + (content.length % 2));
  putText(bytes, 0, id);
  viewOf(bytes).setUint32(4, declaredBytes, true);
  bytes.set(content, 8);
  return bytes;
};

function formatContent(fields: WavHeaderFields): Uint8Array {
  const { sampleRateHz, channelCount, bytesPerSample, isFloat, channelMask = 0 } = fields;
  const isExtensible = channelCount > 2;
  const tag = isFloat ? FORMAT_TAG_FLOAT : FORMAT_TAG_PCM;
  const bytes = new Uint8Array(isExtensible ? 40 : isFloat ? 18 : 16);
  const view = viewOf(bytes);
  view.setUint16(0, isExtensible ? FORMAT_TAG_EXTENSIBLE : tag, true);
  view.setUint16(2, channelCount, true);
  view.setUint32(4, sampleRateHz, true);
  view.setUint32(8, sampleRateHz * channelCount * bytesPerSample, true);
  view.setUint16(12, channelCount * bytesPerSample, true);
  view.setUint16(14, bytesPerSample * 8, true);
  if (isExtensible) {
    view.setUint16(16, 22, true);
    view.setUint16(18, bytesPerSample * 8, true);
    view.setUint32(20, channelMask, true);
    bytes.set([tag, 0, 0, 0, 0, 0, 0x10, 0, 0x80, 0, 0, 0xaa, 0, 0x38, 0x9b, 0x71], 24);
  }
  return bytes;
}

function uint32Content(value: number): Uint8Array {
  const bytes = new Uint8Array(4);
  viewOf(bytes).setUint32(0, Math.min(value, SIZE_ELSEWHERE), true);
  return bytes;
}

function ds64Content(riffBytes: number, dataBytes: number, frameCount: number): Uint8Array {
  const bytes = new Uint8Array(28);
  const view = viewOf(bytes);
  view.setBigUint64(0, BigInt(riffBytes), true);
  view.setBigUint64(8, BigInt(dataBytes), true);
  view.setBigUint64(16, BigInt(frameCount), true);
  return bytes;
}

function checkFields({ sampleRateHz, channelCount, frameCount }: WavHeaderFields): void {
  const checks: readonly [string, number, number, number][] = [
    ['sampleRateHz', sampleRateHz, LOWEST_RATE_HZ, HIGHEST_RATE_HZ],
    ['channelCount', channelCount, 1, MOST_CHANNELS],
    ['frameCount', frameCount, 1, Number.MAX_SAFE_INTEGER / 1024],
  ];
  for (const [name, value, low, high] of checks) {
    if (!Number.isInteger(value) || value < low || value > high) {
      throw new DspInputError(
        'BAD_ARGUMENT',
        `${name} must be a whole number from ${low} to ${high}, not ${value}`,
      );
    }
  }
}

function joinBytes(parts: readonly Uint8Array[]): Uint8Array {
  const bytes = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0));
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes;
}

/**
 * Writes everything that stands before the first frame.
 *
 * Mono and stereo get a plain fmt chunk, in 24 bits too, because every program reads it; Microsoft asks for
 * WAVE_FORMAT_EXTENSIBLE above 16 bits or two channels, and only the channels make a difference to what is played.
 * More channels are extensible, without speaker places unless a mask is given. Float has the `fact` chunk that formats
 * other than PCM need, and so has extensible. What 32-bit sizes can't state becomes RF64 with `ds64` first.
 *
 * @throws DspInputError `BAD_ARGUMENT` for a field out of its range
 * @see Microsoft, WAVEFORMATEXTENSIBLE; EBU Tech 3285 and 3306
 */
export function writeWavHeader(fields: WavHeaderFields): Uint8Array {
  checkFields(fields);
  const { channelCount, frameCount, bytesPerSample, isFloat, broadcast } = fields;
  const dataBytes = frameCount * channelCount * bytesPerSample;
  const middle: Uint8Array[] =
    broadcast === undefined ? [] : [chunk('bext', writeBroadcastExtension(broadcast))];
  middle.push(chunk('fmt ', formatContent(fields)));
  if (isFloat || channelCount > 2) {
    middle.push(chunk('fact', uint32Content(frameCount)));
  }
  const middleBytes = middle.reduce((sum, part) => sum + part.length, 0);
  const plainRiffBytes = 4 + middleBytes + 8 + dataBytes + (dataBytes % 2);
  const isWide = plainRiffBytes >= SIZE_ELSEWHERE;
  const ds64 = isWide ? [chunk('ds64', ds64Content(plainRiffBytes + 36, dataBytes, frameCount))] : [];
  const outermost = new Uint8Array(12);
  putText(outermost, 0, isWide ? 'RF64' : 'RIFF');
  viewOf(outermost).setUint32(4, isWide ? SIZE_ELSEWHERE : plainRiffBytes, true);
  putText(outermost, 8, 'WAVE');
  const dataHead = chunk('data', new Uint8Array(), isWide ? SIZE_ELSEWHERE : dataBytes);
  return joinBytes([outermost, ...ds64, ...middle, dataHead]);
}
