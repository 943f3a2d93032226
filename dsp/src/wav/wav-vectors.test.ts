import wavDecoder from 'wav-decoder';
import { describe, expect, it } from 'vitest';
import vectors from '../../../test-vectors/wav/wav-format.json' with { type: 'json' };
import { createRandom } from '../random/create-random.js';
import { encodeWav } from './create-wav-encoder.js';
import { openWav } from './open-wav.js';
import { bytesFromMemory } from './random-access-bytes.js';
import { chunk, FLOAT_GUID, fmt, hex, PCM_GUID, riff } from './testing/wav-bytes.js';
import { writeWavHeader } from './write-wav-header.js';

const read = async (bytes: Uint8Array): Promise<Float64Array[]> => {
  const wav = await openWav(bytesFromMemory(bytes));
  return wav.read(0, wav.frameCount);
};
const hexText = (bytes: Uint8Array): string =>
  Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join(' ');

// Sources of the table: see README.md beside it.
describe('the table of sample bytes', () => {
  it.each(vectors.samples)(
    'reads $bytesHex as $decoded in $bits bits',
    async ({ bits, bytesHex, decoded }) => {
      const [[sample]] = await read(riff([chunk('fmt ', fmt({ bits })), chunk('data', hex(bytesHex))]));
      expect(Math.abs(sample - decoded)).toBeLessThanOrEqual(1e-15); // the table has 15 digits
      // The code behind it, whole: the value is exact, not only near.
      expect(Number.isInteger(sample * 2 ** (bits - 1))).toBe(true);
    },
  );

  it.each(vectors.samples.filter(({ bits }) => bits === 16 || bits === 24))(
    'writes $value as $bytesHex in $bits bits',
    ({ bits, value, bytesHex }) => {
      const options = { sampleRateHz: 48_000, bits: bits as 16 | 24, dither: 'none', seed: 0 } as const;
      const file = encodeWav([Float64Array.of(value)], options);
      expect(hexText(file.subarray(44, 44 + bits / 8))).toBe(bytesHex);
    },
  );

  it('writes and reads the example file byte for byte', async () => {
    const example = Uint8Array.from(hex(vectors.exampleFileHex));
    expect(await read(example)).toEqual([Float64Array.of(0.5, -0.5)]);
    const options = { sampleRateHz: 48_000, bits: 24, dither: 'none', seed: 0 } as const;
    expect(encodeWav([Float64Array.of(0.5, -0.5)], options)).toEqual(example);
  });
});

describe('the table of layouts', () => {
  const field = (name: string): { offset: number; bytes: number } =>
    [...vectors.fmtChunk, ...vectors.ds64].find((row) => row.name === name)!;
  const header = writeWavHeader({
    sampleRateHz: 96_000,
    channelCount: 6,
    frameCount: 1_000_000_000,
    bytesPerSample: 3,
    isFloat: false,
    channelMask: 0x3f,
  });
  const view = new DataView(header.buffer);

  it('holds for WAVE_FORMAT_EXTENSIBLE as written', () => {
    const at = 12 + 36 + 8; // after RF64's head and ds64
    const value = (name: string): number => {
      const { offset, bytes } = field(name);
      return bytes === 2 ? view.getUint16(at + offset, true) : view.getUint32(at + offset, true);
    };
    const { FL, FR, FC, LFE, BL, BR } = vectors.channelMask;
    expect(value('formatTag')).toBe(0xfffe);
    expect(value('channels')).toBe(6);
    expect(value('rateHz')).toBe(96_000);
    expect(value('byteRate')).toBe(96_000 * 18);
    expect(value('blockAlign')).toBe(18);
    expect(value('bits')).toBe(24);
    expect(value('extensionBytes')).toBe(22);
    expect(value('validBits')).toBe(24);
    expect(value('channelMask')).toBe(FL | FR | FC | LFE | BL | BR);
    expect(hexText(header.subarray(at + 24, at + 40))).toBe(vectors.subFormats.pcm);
    expect([PCM_GUID, FLOAT_GUID]).toEqual([vectors.subFormats.pcm, vectors.subFormats.float]);
  });

  it('holds for RF64, which 18 GB of samples need', () => {
    const value = (name: string): bigint => view.getBigUint64(20 + field(name).offset, true);
    expect(String.fromCharCode(...header.subarray(0, 4), ...header.subarray(12, 16))).toBe('RF64ds64');
    expect(view.getUint32(4, true)).toBe(0xffffffff);
    expect(value('dataSize')).toBe(18_000_000_000n);
    expect(value('riffSize')).toBe(18_000_000_000n + BigInt(header.length - 8));
    expect(value('sampleCount')).toBe(1_000_000_000n);
    expect(view.getUint32(20 + field('tableLength').offset, true)).toBe(0);
    expect(view.getUint32(header.length - 4, true)).toBe(0xffffffff);
  });

  it('opens what it wrote for a file of 18 GB without having it', async () => {
    const wav = await openWav({
      sizeBytes: header.length + 18_000_000_000,
      read: (offset, length) => {
        const bytes = new Uint8Array(length);
        bytes.set(header.subarray(offset, offset + length));
        return Promise.resolve(bytes);
      },
    });
    expect(wav).toMatchObject({ container: 'RF64', frameCount: 1_000_000_000, warnings: [] });
    expect((await wav.read(999_999_999, 5)).map((channel) => channel.length)).toEqual([1, 1, 1, 1, 1, 1]);
  });
});

// wav-decoder 1.3.0 (npm), with `symmetric`: the scale is 2^(bits - 1); it keeps Float32 and reads the smallest 24-bit
// code as +1, so that code is left out.
describe('an independent reader', () => {
  it.each([
    { bits: 16, dither: 'tpdf' },
    { bits: 24, dither: 'tpdf' },
    { bits: '32f', dither: 'none' },
  ] as const)('reads the same from a file of $bits bits', async ({ bits, dither }) => {
    const random = createRandom(7);
    const channels = [0, 1].map(() => Float64Array.from({ length: 4001 }, () => 1.9 * random() - 0.95));
    const file = encodeWav(channels, { sampleRateHz: 44_100, bits, dither, seed: 3 });
    const theirs = wavDecoder.decode.sync(file.slice().buffer, { symmetric: true });
    const ours = await read(file);
    expect(theirs).toMatchObject({ sampleRate: 44_100, numberOfChannels: 2, length: 4001 });
    ours.forEach((samples, index) => expect(Float32Array.from(samples)).toEqual(theirs.channelData[index]));
  });
});
