import { describe, expect, it } from 'vitest';
import { openWav } from './open-wav.js';
import { bytesFromMemory } from './random-access-bytes.js';
import {
  ascii,
  chunk,
  FLOAT_GUID,
  fmt,
  hex,
  plainWav,
  riff,
  SAMPLES_16,
  u32,
  u64,
} from './testing/wav-bytes.js';
import type { WavFile } from './wav-file.js';

const open = (bytes: Uint8Array): Promise<WavFile> => openWav(bytesFromMemory(bytes));
const codes = (wav: WavFile): string[] => wav.warnings.map(({ code }) => code);

const EXPECTED_16 = [0.5, -0.5, 0, -1];
const data = chunk('data', SAMPLES_16);
const info = chunk('LIST', [...ascii('INFOISFT'), ...u32(4), ...ascii('abc\0')]);
const ds64 = (dataSize: bigint, frames = 4n, riffSize = 80n): number[] =>
  chunk('ds64', [...u64(riffSize), ...u64(dataSize), ...u64(frames), ...u32(0)]);
const ALL_ONES = 0xffffffff;
const openData = chunk('data', SAMPLES_16, { size: ALL_ONES });

interface Accepted {
  name: string;
  bytes: Uint8Array;
  /** Samples of each channel. */
  samples: number[][];
  warnings?: string[];
  format?: Partial<WavFile['format']>;
}

const plain: Accepted[] = [
  { name: 'plain 16-bit', bytes: plainWav(), samples: [EXPECTED_16] },
  {
    name: '8-bit offset binary, odd data with its pad',
    bytes: riff([chunk('fmt ', fmt({ bits: 8 })), chunk('data', hex('00 40 80 c0 ff'))]),
    samples: [[-1, -0.5, 0, 0.5, 127 / 128]],
  },
  {
    name: '24-bit stereo',
    bytes: riff([
      chunk('fmt ', fmt({ bits: 24, channels: 2 })),
      chunk('data', hex('000040 0000c0 ffff7f 000080')),
    ]),
    samples: [
      [0.5, 1 - 2 ** -23],
      [-0.5, -1],
    ],
  },
  {
    name: '32-bit PCM',
    bytes: riff([chunk('fmt ', fmt({ bits: 32 })), chunk('data', hex('01000000 ffffff7f 00000080'))]),
    samples: [[2 ** -31, 1 - 2 ** -31, -1]],
  },
  {
    name: '32-bit float beyond full scale, kept',
    bytes: riff([chunk('fmt ', fmt({ tag: 3, bits: 32 })), chunk('data', hex('0000c03f 000080bf'))]),
    samples: [[1.5, -1]],
    format: { sampleFormat: 'float', bitsPerSample: 32 },
  },
  {
    name: '64-bit float with cbSize 0 and fact',
    bytes: riff([
      chunk('fmt ', [...fmt({ tag: 3, bits: 64 }), 0, 0]),
      chunk('fact', u32(1)),
      chunk('data', hex('00000000 0000e0bf')),
    ]),
    samples: [[-0.5]],
  },
  {
    name: 'extensible 24 valid bits in 32',
    bytes: riff([
      chunk('fmt ', fmt({ bits: 32, channels: 2, extensible: { validBits: 24, mask: 3 } })),
      chunk('data', hex('00000040 000000c0')),
    ]),
    samples: [[0.5], [-0.5]],
    format: { bitsPerSample: 24, containerBits: 32, channelMask: 3, isExtensible: true },
  },
  {
    name: 'extensible float',
    bytes: riff([
      chunk('fmt ', fmt({ bits: 32, extensible: { guid: FLOAT_GUID } })),
      chunk('data', hex('0000003f')),
    ]),
    samples: [[0.5]],
    format: { sampleFormat: 'float' },
  },
  {
    name: 'extensible with valid bits left 0',
    bytes: riff([chunk('fmt ', fmt({ extensible: { validBits: 0 } })), data]),
    samples: [EXPECTED_16],
    format: { bitsPerSample: 16 },
  },
  {
    name: 'plain 20 bits in 3 bytes',
    bytes: riff([
      chunk('fmt ', fmt({ bits: 20, blockAlign: 3 })),
      chunk('data', hex('000040'), { pad: [0] }),
    ]),
    samples: [[0.5]],
    format: { bitsPerSample: 20, containerBits: 24 },
  },
  {
    name: '32 channels',
    bytes: riff([
      chunk('fmt ', fmt({ channels: 32 })),
      chunk(
        'data',
        Array.from({ length: 64 }, (_, n) => n),
      ),
    ]),
    samples: Array.from({ length: 32 }, (_, n) => [(2 * n + 256 * (2 * n + 1)) / 32768]),
  },
];

const chunkOrders: Accepted[] = [
  { name: 'data before fmt', bytes: riff([data, chunk('fmt ', fmt())]), samples: [EXPECTED_16] },
  {
    name: 'JUNK, LIST and bext-like chunks on both sides',
    bytes: riff([
      chunk('JUNK', Array<number>(28).fill(0)),
      info,
      chunk('fmt ', fmt()),
      chunk('Zzz9', [1, 2]),
      data,
      info,
    ]),
    samples: [EXPECTED_16],
  },
  {
    name: 'an odd unknown chunk with its pad',
    bytes: riff([chunk('Zzz9', [1, 2, 3]), chunk('fmt ', fmt()), data]),
    samples: [EXPECTED_16],
  },
  {
    name: 'an odd unknown chunk with a pad byte that is a letter',
    bytes: riff([chunk('Zzz9', [1, 2, 3], { pad: ascii('X') }), chunk('fmt ', fmt()), data]),
    samples: [EXPECTED_16],
  },
  {
    name: 'an odd chunk without its pad before a known chunk',
    bytes: riff([chunk('Zzz9', [1, 2, 3], { pad: [] }), chunk('fmt ', fmt()), data]),
    samples: [EXPECTED_16],
    warnings: ['pad-byte-missing'],
  },
  {
    name: 'an odd chunk without its pad before an unknown chunk',
    bytes: riff([chunk('fmt ', fmt()), chunk('Zzz9', [1], { pad: [] }), chunk('Yyy8', [1, 2]), data]),
    samples: [EXPECTED_16],
    warnings: ['pad-byte-missing'],
  },
  {
    name: 'odd data without pad before LIST',
    bytes: riff([chunk('fmt ', fmt({ bits: 8 })), chunk('data', [0x80, 0xc0, 0x40], { pad: [] }), info]),
    samples: [[0, 0.5, -0.5]],
    warnings: ['pad-byte-missing'],
  },
  {
    name: 'odd data at the end without pad',
    bytes: riff([chunk('fmt ', fmt({ bits: 8 })), chunk('data', [0x80, 0xc0, 0x40], { pad: [] })]),
    samples: [[0, 0.5, -0.5]],
  },
  {
    name: 'two equal fmt chunks',
    bytes: riff([chunk('fmt ', fmt()), chunk('fmt ', fmt()), data]),
    samples: [EXPECTED_16],
  },
  {
    name: 'two data chunks: the first counts',
    bytes: riff([chunk('fmt ', fmt()), data, chunk('data', hex('0100'))]),
    samples: [EXPECTED_16],
    warnings: ['second-data-chunk'],
  },
  {
    name: 'an empty data chunk before the real one',
    bytes: riff([chunk('fmt ', fmt()), chunk('data', []), data]),
    samples: [EXPECTED_16],
    warnings: ['second-data-chunk'],
  },
];

const wrongSizes: Accepted[] = [
  ...[0, ALL_ONES, 0x7ffff000, 0x7fffffff].map((size) => ({
    name: `data size ${size.toString(16)} from a recorder that never came back to it`,
    bytes: riff([chunk('fmt ', fmt()), chunk('data', SAMPLES_16, { size })], { size }),
    samples: [EXPECTED_16],
    warnings: ['size-not-set'],
  })),
  {
    name: 'data size beyond the end',
    bytes: riff([chunk('fmt ', fmt()), chunk('data', SAMPLES_16, { size: 8000 })], { size: 8036 }),
    samples: [EXPECTED_16],
    warnings: ['file-size-lies'],
  },
  {
    name: 'data size beyond the end and a frame cut in two',
    bytes: riff([chunk('fmt ', fmt()), chunk('data', SAMPLES_16.slice(0, 7), { size: 8000, pad: [] })]),
    samples: [EXPECTED_16.slice(0, 3)],
    warnings: ['file-size-lies', 'last-frame-cut'],
  },
  {
    name: 'data size that is no multiple of the frame',
    bytes: riff([chunk('fmt ', fmt({ channels: 2 })), chunk('data', SAMPLES_16.slice(0, 6))]),
    samples: [[0.5], [-0.5]],
    warnings: ['last-frame-cut'],
  },
  {
    name: 'a RIFF size too small',
    bytes: riff([chunk('fmt ', fmt()), data], { size: 20 }),
    samples: [EXPECTED_16],
    warnings: ['riff-size-wrong'],
  },
  {
    name: 'a RIFF size too large',
    bytes: riff([chunk('fmt ', fmt()), data], { size: 5000 }),
    samples: [EXPECTED_16],
    warnings: ['riff-size-wrong'],
  },
  {
    name: 'bytes behind the last chunk',
    bytes: Uint8Array.from([...plainWav(), 1, 2, 3, 4, 5, 6, 7, 8, 9]),
    samples: [EXPECTED_16],
    warnings: ['riff-size-wrong', 'trailing-bytes'],
  },
  {
    name: 'a last chunk cut short',
    bytes: riff([chunk('fmt ', fmt()), data, chunk('LIST', ascii('INFO'), { size: 400 })]),
    samples: [EXPECTED_16],
    warnings: ['chunk-cut-short'],
  },
  {
    name: 'a wrong byte rate',
    bytes: riff([chunk('fmt ', fmt({ byteRate: 7 })), data]),
    samples: [EXPECTED_16],
    warnings: ['byte-rate-wrong'],
  },
  {
    name: 'a wrong count in fact',
    bytes: riff([chunk('fmt ', fmt()), chunk('fact', u32(99)), data]),
    samples: [EXPECTED_16],
    warnings: ['frame-count-differs'],
  },
  {
    name: 'a fact chunk too short to read',
    bytes: riff([chunk('fmt ', fmt()), chunk('fact', [1, 2]), data]),
    samples: [EXPECTED_16],
  },
  {
    name: 'a bext chunk too short',
    bytes: riff([chunk('bext', Array<number>(601).fill(65)), chunk('fmt ', fmt()), data]),
    samples: [EXPECTED_16],
    warnings: ['chunk-malformed'],
  },
  {
    name: 'a row of 5,000 empty chunks behind the samples',
    bytes: riff([chunk('fmt ', fmt()), data, ...Array.from({ length: 5000 }, () => chunk('Zzz9', []))]),
    samples: [EXPECTED_16],
    warnings: ['too-many-chunks'],
  },
];

const wideFile = (head: number[], id = 'RF64'): Uint8Array =>
  riff([head, chunk('fmt ', fmt()), openData], { id, size: ALL_ONES });
const wide: Accepted[] = [
  { name: 'RF64', bytes: wideFile(ds64(8n)), samples: [EXPECTED_16] },
  { name: 'BW64', bytes: wideFile(ds64(8n), 'BW64'), samples: [EXPECTED_16] },
  {
    name: 'RF64 with a chunk after the data',
    bytes: riff([ds64(8n, 4n, 104n), chunk('fmt ', fmt()), openData, info], { id: 'RF64', size: ALL_ONES }),
    samples: [EXPECTED_16],
  },
  {
    name: 'RF64 whose data chunk has a size of its own',
    bytes: riff([ds64(999n), chunk('fmt ', fmt()), data], { id: 'RF64', size: ALL_ONES }),
    samples: [EXPECTED_16],
  },
  {
    name: 'RF64 that gives the size of another chunk in its table',
    bytes: riff(
      [
        chunk('ds64', [...u64(104n), ...u64(8n), ...u64(4n), ...u32(1), ...ascii('Zzz9'), ...u64(4n)]),
        chunk('Zzz9', [1, 2, 3, 4], { size: ALL_ONES }),
        chunk('fmt ', fmt()),
        openData,
      ],
      { id: 'RF64', size: ALL_ONES },
    ),
    samples: [EXPECTED_16],
  },
  {
    name: 'RF64 without ds64',
    bytes: riff([chunk('fmt ', fmt()), openData], { id: 'RF64', size: ALL_ONES }),
    samples: [EXPECTED_16],
    warnings: ['size-not-set', 'size-table-missing'],
  },
  {
    name: 'RF64 with a ds64 too short',
    bytes: wideFile(chunk('ds64', u64(8n))),
    samples: [EXPECTED_16],
    warnings: ['size-not-set', 'size-table-missing'],
  },
  { name: 'ds64 data size 0', bytes: wideFile(ds64(0n)), samples: [EXPECTED_16], warnings: ['size-not-set'] },
  {
    name: 'ds64 data size beyond the end',
    bytes: wideFile(ds64(8000n)),
    samples: [EXPECTED_16],
    warnings: ['file-size-lies'],
  },
  {
    name: 'ds64 data size 2^64 - 1',
    bytes: wideFile(ds64(2n ** 64n - 1n)),
    samples: [EXPECTED_16],
    warnings: ['file-size-lies'],
  },
  {
    name: 'ds64 data size too small',
    bytes: wideFile(ds64(4n, 2n)),
    samples: [[0.5, -0.5]],
    warnings: ['trailing-bytes'],
  },
  {
    name: 'ds64 frame count wrong',
    bytes: wideFile(ds64(8n, 5n)),
    samples: [EXPECTED_16],
    warnings: ['frame-count-differs'],
  },
  {
    name: 'ds64 RIFF size wrong',
    bytes: wideFile(ds64(8n, 4n, 4000n)),
    samples: [EXPECTED_16],
    warnings: ['riff-size-wrong'],
  },
  {
    name: 'ds64 with an absurd table length',
    bytes: wideFile(chunk('ds64', [...u64(80n), ...u64(8n), ...u64(4n), ...u32(ALL_ONES)])),
    samples: [EXPECTED_16],
  },
];

describe.each([
  { group: 'formats', files: plain },
  { group: 'orders and pads', files: chunkOrders },
  { group: 'sizes that are wrong', files: wrongSizes },
  { group: 'RF64 and BW64', files: wide },
])('opening a file: $group', ({ files }) => {
  it.each(files)('reads $name', async ({ bytes, samples, warnings = [], format = {} }) => {
    const wav = await open(bytes);
    expect(codes(wav)).toEqual(warnings);
    expect(wav.format).toMatchObject(format);
    expect((await wav.read(0, wav.frameCount)).map((channel) => Array.from(channel))).toEqual(samples);
    expect(wav).toMatchObject({
      channelCount: samples.length,
      frameCount: samples[0].length,
      dataSizeBytes: samples[0].length * wav.format.blockAlign,
    });
    expect(wav.warnings.every(({ message }) => !message.includes('{'))).toBe(true);
  });
});

describe('an opened file', () => {
  it('lists its chunks with their places', async () => {
    const wav = await open(riff([chunk('fmt ', fmt()), chunk('Zzz9', [7]), data]));
    expect(wav.chunks).toEqual([
      { id: 'fmt ', offset: 20, sizeBytes: 16 },
      { id: 'Zzz9', offset: 44, sizeBytes: 1 },
      { id: 'data', offset: 54, sizeBytes: 8 },
    ]);
    expect(wav).toMatchObject({ container: 'RIFF', dataOffset: 54, broadcast: null });
  });

  it('reads any run, whatever block it falls into, and nothing past the end', async () => {
    const wav = await open(plainWav());
    expect(await wav.read(1, 2)).toEqual([Float64Array.of(-0.5, 0)]);
    expect(await wav.read(3, 50)).toEqual([Float64Array.of(-1)]);
    expect(await wav.read(4, 1)).toEqual([new Float64Array()]);
    await expect(wav.read(5, 1)).rejects.toMatchObject({ code: 'OUT_OF_RANGE' });
  });
});
