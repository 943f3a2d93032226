import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DspInputError } from '../errors.js';
import { encodeWav } from './create-wav-encoder.js';
import { inspectWav } from './inspect-wav.js';
import { openWav } from './open-wav.js';
import { bytesFromMemory } from './random-access-bytes.js';
import { chunk, FLOAT_GUID, fmt, riff, SAMPLES_16, u32, u64 } from './testing/wav-bytes.js';

const SEED = 20_310_405;
const read = async (bytes: Uint8Array): Promise<Float64Array[]> => {
  const wav = await openWav(bytesFromMemory(bytes));
  return wav.read(0, wav.frameCount);
};
/** Whole codes of a bit depth, with the ends and the middle more often than chance has them. */
const codes = (bits: number): fc.Arbitrary<number[]> => {
  const [low, high] = [-(2 ** (bits - 1)), 2 ** (bits - 1) - 1];
  const code = fc.oneof(
    fc.constantFrom(low, low + 1, -1, 0, 1, high - 1, high),
    fc.integer({ min: low, max: high }),
  );
  return fc.array(code, { minLength: 1, maxLength: 40 });
};

describe('writing and reading again', () => {
  it.each([16, 24] as const)(
    'is exact for every code of %i bits, in any number of channels',
    async (bits) => {
      await fc.assert(
        fc.asyncProperty(codes(bits), fc.integer({ min: 1, max: 8 }), async (values, channelCount) => {
          const samples = Float64Array.from(values, (code) => code / 2 ** (bits - 1));
          const channels = Array.from({ length: channelCount }, () => samples);
          const file = encodeWav(channels, { sampleRateHz: 48_000, bits, dither: 'none', seed: 0 });
          expect(await read(file)).toEqual(channels);
        }),
        { seed: SEED, numRuns: 300 },
      );
    },
  );

  it('is exact for all 65,536 codes of 16 bits', async () => {
    const samples = Float64Array.from({ length: 65_536 }, (_, n) => (n - 32_768) / 32_768);
    const file = encodeWav([samples], { sampleRateHz: 48_000, bits: 16, dither: 'none', seed: 0 });
    expect(await read(file)).toEqual([samples]);
  });

  it('is exact for 32-bit float, beyond full scale as well', async () => {
    const float = fc.float({ noNaN: true, noDefaultInfinity: true });
    await fc.assert(
      fc.asyncProperty(fc.array(float, { minLength: 1, maxLength: 40 }), async (values) => {
        const samples = Float64Array.from(values);
        expect(
          await read(encodeWav([samples], { sampleRateHz: 48_000, bits: '32f', dither: 'none', seed: 0 })),
        ).toEqual([samples]);
      }),
      { seed: SEED, numRuns: 300 },
    );
  });

  it('is exact for codes of 8 and 32 bits written by hand', async () => {
    await fc.assert(
      fc.asyncProperty(codes(8), codes(32), async (bytes, words) => {
        const unsigned = bytes.map((code) => code + 128);
        const [eight] = await read(riff([chunk('fmt ', fmt({ bits: 8 })), chunk('data', unsigned)]));
        expect(eight).toEqual(Float64Array.from(bytes, (code) => code / 128));
        const [full] = await read(
          riff([
            chunk('fmt ', fmt({ bits: 32 })),
            chunk(
              'data',
              words.flatMap((word) => u32(word)),
            ),
          ]),
        );
        expect(full).toEqual(Float64Array.from(words, (code) => code / 2 ** 31));
      }),
      { seed: SEED, numRuns: 200 },
    );
  });
});

const floats = (count: number): number[] =>
  Array.from(new Uint8Array(new Float32Array(count).fill(0.25).buffer));
const broadcast = { description: 'x', codingHistory: 'A=PCM\n', loudness: null };
const sound = Float64Array.from({ length: 30 }, (_, n) => Math.sin(n));
const ACCEPTED: readonly Uint8Array[] = [
  riff([chunk('fmt ', fmt()), chunk('data', SAMPLES_16)]),
  riff([chunk('data', SAMPLES_16), chunk('Zzz9', [1, 2, 3]), chunk('fmt ', fmt())]),
  riff([
    chunk('fmt ', fmt({ bits: 32, channels: 2, extensible: { guid: FLOAT_GUID } })),
    chunk('fact', u32(8)),
    chunk('data', floats(16)),
  ]),
  riff(
    [
      chunk('ds64', [...u64(80n), ...u64(8n), ...u64(4n), ...u32(0)]),
      chunk('fmt ', fmt()),
      chunk('data', SAMPLES_16, { size: 0xffffffff }),
    ],
    { id: 'RF64', size: 0xffffffff },
  ),
  encodeWav([sound, sound, sound], { sampleRateHz: 96_000, bits: 24, dither: 'tpdf', seed: 1, broadcast }),
];

/** Opens and reads a damaged file; nothing but the reader's own error may come out, with its place and its remedy. */
async function isAnswered(bytes: Uint8Array): Promise<boolean> {
  const started = performance.now();
  try {
    const wav = await openWav(bytesFromMemory(bytes));
    const { peakFs } = await inspectWav(wav);
    expect(wav.dataOffset + wav.dataSizeBytes).toBeLessThanOrEqual(bytes.length);
    expect(peakFs.every(Number.isFinite)).toBe(true);
  } catch (error) {
    expect(error).toBeInstanceOf(DspInputError);
    expect((error as DspInputError).details.offset).toBeGreaterThanOrEqual(0);
    expect((error as DspInputError).details.remedy).toBeTruthy();
  }
  return performance.now() - started < 1000;
}

describe('damage', () => {
  it('by flipped bits in the first 200 bytes is answered at once, by samples or by the reader’s own error', async () => {
    const flips = fc.array(fc.tuple(fc.nat(199), fc.nat(7)), { minLength: 1, maxLength: 6 });
    await fc.assert(
      fc.asyncProperty(fc.constantFrom(...ACCEPTED), flips, async (file, places) => {
        const bytes = file.slice();
        for (const [at, bit] of places) {
          bytes[at % bytes.length] ^= 1 << bit;
        }
        return isAnswered(bytes);
      }),
      { seed: SEED, numRuns: 4000 },
    );
  });

  it('by whole bytes, cuts and repetitions is answered too', async () => {
    const byte = fc.constantFrom(0, 1, 0x20, 0x7f, 0x80, 0xfe, 0xff);
    const edits = fc.array(fc.tuple(fc.nat(250), byte), { maxLength: 8 });
    await fc.assert(
      fc.asyncProperty(
        fc.constantFrom(...ACCEPTED),
        edits,
        fc.nat(900),
        fc.boolean(),
        async (file, places, cut, twice) => {
          const bytes = file.slice(0, cut);
          places.filter(([at]) => at < bytes.length).forEach(([at, value]) => (bytes[at] = value));
          return isAnswered(twice ? Uint8Array.from([...bytes, ...bytes]) : bytes);
        },
      ),
      { seed: SEED, numRuns: 3000 },
    );
  });

  it('by a cut at every byte leaves an answer', async () => {
    for (const file of ACCEPTED) {
      for (let length = 0; length < file.length; length++) {
        expect(await isAnswered(file.subarray(0, length))).toBe(true);
      }
    }
  });
});
