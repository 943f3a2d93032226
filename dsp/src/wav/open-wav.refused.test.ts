import { describe, expect, it } from 'vitest';
import type { DspErrorCode, DspInputError } from '../errors.js';
import { openWav } from './open-wav.js';
import { bytesFromMemory } from './random-access-bytes.js';
import {
  ascii,
  chunk,
  FLOAT_GUID,
  fmt,
  type FormatFields,
  hex,
  plainWav,
  riff,
  SAMPLES_16,
} from './testing/wav-bytes.js';

const data = chunk('data', SAMPLES_16);
const text = (...parts: (string | number[])[]): Uint8Array =>
  Uint8Array.from(
    parts
      .flatMap((part) => (typeof part === 'string' ? ascii(part) : part))
      .concat(Array<number>(64).fill(0)),
  );
const withFormat = (fields: FormatFields): Uint8Array => riff([chunk('fmt ', fmt(fields)), data]);

interface Refused {
  name: string;
  bytes: Uint8Array;
  code: DspErrorCode;
  offset: number;
  /** What the message must name. */
  says?: RegExp;
}

const others: Refused[] = [
  { name: 'Wave64', bytes: text('riff', hex('2e91cf11a5d628db04c10000')), says: /Wave64/ },
  { name: 'RIFX', bytes: riff([chunk('fmt ', fmt()), data], { id: 'RIFX' }), says: /big-endian RIFX/ },
  { name: 'AIFF', bytes: text('FORM', [0, 0, 1, 0], 'AIFFCOMM'), says: /AIFF/ },
  { name: 'AIFF-C', bytes: text('FORM', [0, 0, 1, 0], 'AIFCFVER'), says: /AIFF-C/ },
  { name: 'FLAC', bytes: text('fLaC'), says: /FLAC/ },
  { name: 'Ogg', bytes: text('OggS'), says: /Ogg/ },
  { name: 'MP3 with a tag', bytes: text('ID3', [4, 0]), says: /MP3/ },
  { name: 'MP3 without a tag', bytes: text(hex('fffb9064')), says: /MPEG audio/ },
  { name: 'MP4', bytes: text([0, 0, 0, 32], 'ftypM4A '), says: /MP4/ },
  { name: 'gzip', bytes: text(hex('1f8b0800')), says: /gzip/ },
  { name: 'zip', bytes: text('PK', [3, 4]), says: /zip/ },
  { name: 'Core Audio', bytes: text('caff'), says: /Core Audio/ },
  { name: 'AU', bytes: text('.snd'), says: /AU/ },
  { name: 'PNG', bytes: text([0x89], 'PNG'), says: /PNG/ },
  { name: 'PDF', bytes: text('%PDF-1.7'), says: /PDF/ },
  { name: 'HTML', bytes: text('<!doctype html>'), says: /HTML/ },
  { name: 'Matroska', bytes: text(hex('1a45dfa3')), says: /Matroska/ },
].map((file) => ({ ...file, code: 'WAV_OTHER_CONTAINER' as const, offset: 0 }));

const containers: Refused[] = [
  ...others,
  { name: 'AVI', bytes: riff([], { form: 'AVI ' }), code: 'WAV_OTHER_CONTAINER', offset: 8, says: /AVI/ },
  {
    name: 'another RIFF form',
    bytes: riff([], { form: 'ABCD' }),
    code: 'WAV_OTHER_CONTAINER',
    offset: 8,
    says: /"ABCD"/,
  },
  {
    name: 'RF64 that is not WAVE',
    bytes: riff([], { id: 'RF64', form: 'ABCD' }),
    code: 'WAV_NOT_RIFF',
    offset: 8,
  },
  { name: 'an empty file', bytes: new Uint8Array(), code: 'WAV_EMPTY_FILE', offset: 0 },
  {
    name: 'RIFF and nothing more',
    bytes: Uint8Array.from(ascii('RIFF')),
    code: 'WAV_TRUNCATED_HEADER',
    offset: 4,
  },
  { name: '11 bytes', bytes: plainWav().slice(0, 11), code: 'WAV_TRUNCATED_HEADER', offset: 11 },
  { name: 'one byte', bytes: Uint8Array.of(82), code: 'WAV_NOT_RIFF', offset: 0 },
  { name: 'zeros', bytes: new Uint8Array(4096), code: 'WAV_NOT_RIFF', offset: 0, says: /00 00 00 00/ },
  { name: 'text', bytes: text('Dear reader'), code: 'WAV_NOT_RIFF', offset: 0 },
];

const compressed: Refused[] = (
  [
    [0, /no format/],
    [2, /ADPCM/],
    [6, /A-law/],
    [7, /mu-law/],
    [0x11, /IMA ADPCM/],
    [0x31, /GSM/],
    [0x50, /MPEG/],
    [0x55, /MP3/],
    [0xff, /AAC/],
    [0x1234, /0x1234/],
  ] as const
).map(([tag, says]) => ({
  name: `format tag ${tag}`,
  bytes: withFormat({ tag }),
  code: 'WAV_COMPRESSED' as const,
  offset: 20,
  says,
}));

const PCM_LIKE = '01 00 00 00 21 07 d3 11 86 44 c8 c1 ca 00 00 00';
const aLawGuid = FLOAT_GUID.replace('03', '06');
const formats: Refused[] = [
  ...compressed,
  {
    name: 'A-law in the GUID',
    bytes: withFormat({ extensible: { guid: aLawGuid } }),
    code: 'WAV_COMPRESSED',
    offset: 44,
    says: /A-law/,
  },
  {
    name: 'a foreign GUID',
    bytes: withFormat({ extensible: { guid: PCM_LIKE } }),
    code: 'WAV_COMPRESSED',
    offset: 44,
  },
  { name: 'no channels', bytes: withFormat({ channels: 0 }), code: 'WAV_BAD_CHANNEL_COUNT', offset: 22 },
  { name: '33 channels', bytes: withFormat({ channels: 33 }), code: 'WAV_BAD_CHANNEL_COUNT', offset: 22 },
  {
    name: '65535 channels',
    bytes: withFormat({ channels: 65535, blockAlign: 2 }),
    code: 'WAV_BAD_CHANNEL_COUNT',
    offset: 22,
  },
  { name: 'rate 0', bytes: withFormat({ rateHz: 0 }), code: 'WAV_BAD_SAMPLE_RATE', offset: 24 },
  { name: 'rate 999', bytes: withFormat({ rateHz: 999 }), code: 'WAV_BAD_SAMPLE_RATE', offset: 24 },
  { name: 'rate 1536001', bytes: withFormat({ rateHz: 1_536_001 }), code: 'WAV_BAD_SAMPLE_RATE', offset: 24 },
  {
    name: 'rate 2^32 - 1',
    bytes: withFormat({ rateHz: 0xffffffff }),
    code: 'WAV_BAD_SAMPLE_RATE',
    offset: 24,
    says: /4294967295 Hz/,
  },
  { name: 'block size 0', bytes: withFormat({ blockAlign: 0 }), code: 'WAV_BAD_BLOCK_ALIGN', offset: 32 },
  { name: 'block size 3', bytes: withFormat({ blockAlign: 3 }), code: 'WAV_BAD_BLOCK_ALIGN', offset: 32 },
  {
    name: 'block size 65535',
    bytes: withFormat({ blockAlign: 65535 }),
    code: 'WAV_BAD_BLOCK_ALIGN',
    offset: 32,
  },
  { name: '0 bits', bytes: withFormat({ bits: 0, blockAlign: 2 }), code: 'WAV_BAD_BIT_DEPTH', offset: 34 },
  { name: '7 bits', bytes: withFormat({ bits: 7, blockAlign: 1 }), code: 'WAV_BAD_BIT_DEPTH', offset: 34 },
  { name: '33 bits', bytes: withFormat({ bits: 33, blockAlign: 5 }), code: 'WAV_BAD_BIT_DEPTH', offset: 34 },
  { name: '64-bit PCM', bytes: withFormat({ bits: 64 }), code: 'WAV_BAD_BIT_DEPTH', offset: 34 },
  {
    name: '65535 bits',
    bytes: withFormat({ bits: 65535, blockAlign: 2 }),
    code: 'WAV_BAD_BIT_DEPTH',
    offset: 34,
  },
  {
    name: '16-bit float',
    bytes: withFormat({ tag: 3, bits: 16 }),
    code: 'WAV_BAD_BIT_DEPTH',
    offset: 34,
    says: /float/,
  },
  {
    name: 'extensible 20 bits in no container',
    bytes: withFormat({ bits: 20, blockAlign: 3, extensible: {} }),
    code: 'WAV_BAD_BIT_DEPTH',
    offset: 34,
  },
  {
    name: 'more valid bits than bits',
    bytes: withFormat({ extensible: { validBits: 24 } }),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 38,
  },
  {
    name: '4 valid bits',
    bytes: withFormat({ extensible: { validBits: 4 } }),
    code: 'WAV_BAD_BIT_DEPTH',
    offset: 38,
  },
  {
    name: 'extensible with cbSize 0',
    bytes: withFormat({ extensible: { cbSize: 0 } }),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 36,
  },
  {
    name: 'extensible without extension',
    bytes: withFormat({ tag: 0xfffe }),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 36,
  },
  {
    name: 'a fmt chunk of 14 bytes',
    bytes: riff([chunk('fmt ', fmt().slice(0, 14)), data]),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 20,
  },
  {
    name: 'an empty fmt chunk',
    bytes: riff([chunk('fmt ', []), data]),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 20,
  },
  {
    name: 'two fmt chunks that differ',
    bytes: riff([chunk('fmt ', fmt()), chunk('fmt ', fmt({ rateHz: 44_100 })), data]),
    code: 'WAV_FORMAT_CONTRADICTORY',
    offset: 36,
  },
];

const chunks: Refused[] = [
  { name: 'no chunks', bytes: riff([]), code: 'WAV_FORMAT_MISSING', offset: 12 },
  { name: 'no fmt', bytes: riff([data]), code: 'WAV_FORMAT_MISSING', offset: 28 },
  { name: 'no data', bytes: riff([chunk('fmt ', fmt())]), code: 'WAV_DATA_MISSING', offset: 36 },
  { name: 'a cut inside fmt', bytes: plainWav().slice(0, 30), code: 'WAV_TRUNCATED_HEADER', offset: 30 },
  {
    name: 'a cut inside the head of data',
    bytes: plainWav().slice(0, 40),
    code: 'WAV_DATA_MISSING',
    offset: 36,
  },
  {
    name: 'an unknown chunk that swallows the samples',
    bytes: riff([chunk('fmt ', fmt()), chunk('Zzz9', [1, 2], { size: 0xfffffff0 }), data]),
    code: 'WAV_DATA_MISSING',
    offset: 36,
    says: /"Zzz9" claims 4294967280 bytes/,
  },
  {
    name: 'fmt behind data without a size',
    bytes: riff([chunk('data', SAMPLES_16, { size: 0xffffffff }), chunk('fmt ', fmt())]),
    code: 'WAV_FORMAT_MISSING',
    offset: 12,
  },
  {
    name: 'empty data at the end',
    bytes: riff([chunk('fmt ', fmt()), chunk('data', [])]),
    code: 'WAV_DATA_EMPTY',
    offset: 44,
  },
  {
    name: 'empty data before LIST',
    bytes: riff([chunk('fmt ', fmt()), chunk('data', []), chunk('LIST', ascii('INFO'))]),
    code: 'WAV_DATA_EMPTY',
    offset: 44,
  },
  {
    name: 'half a frame',
    bytes: riff([chunk('fmt ', fmt({ channels: 2 })), chunk('data', [1, 2])]),
    code: 'WAV_DATA_EMPTY',
    offset: 44,
  },
  {
    name: 'a name that is none',
    bytes: riff([hex('00 01 02 03 04 00 00 00 00 00 00 00'), chunk('fmt ', fmt()), data]),
    code: 'WAV_FORMAT_MISSING',
    offset: 12,
  },
  {
    name: '100,000 empty chunks',
    bytes: riff([...Array.from({ length: 100_000 }, () => chunk('Zzz9', [])), chunk('fmt ', fmt()), data]),
    code: 'WAV_TOO_MANY_CHUNKS',
    offset: 12 + 1024 * 8,
  },
];

describe.each([
  { group: 'other containers', files: containers },
  { group: 'formats', files: formats },
  { group: 'chunks', files: chunks },
])('refusing a file: $group', ({ files }) => {
  it.each(files)('names $name, the byte and what to do', async ({ bytes, code, offset, says = /./ }) => {
    const started = performance.now();
    const error = await openWav(bytesFromMemory(bytes)).then(
      () => null,
      (reason: DspInputError) => reason,
    );
    expect(error).toMatchObject({ name: 'DspInputError', code, details: { offset } });
    expect(error!.message).toMatch(says);
    expect(error!.message).toContain(`byte ${offset}`);
    expect(error!.message).not.toContain('\n');
    expect(error!.details.found).not.toBe('');
    expect(error!.details.remedy).toMatch(/\.$/);
    // A header is answered within milliseconds; a busy test machine gets ten times as long as the hardest needs.
    expect(performance.now() - started).toBeLessThan(500);
  });
});

describe('samples that are no numbers', () => {
  const floatFile = (samples: string): Uint8Array =>
    riff([chunk('fmt ', fmt({ tag: 3, bits: 32, channels: 2 })), chunk('data', hex(samples))]);

  it.each([
    { name: 'NaN', bits: '0000c07f', found: 'NaN' },
    { name: 'Infinity', bits: '0000807f', found: 'Infinity' },
    { name: '-Infinity', bits: '000080ff', found: '-Infinity' },
  ])('refuses $name on reading, with frame, channel and byte', async ({ bits, found }) => {
    const wav = await openWav(
      bytesFromMemory(floatFile(`0000003f 0000003f 0000003f ${bits} 0000c07f 00000000`)),
    );
    await expect(wav.read(0, 3)).rejects.toMatchObject({
      code: 'NON_FINITE_SAMPLE',
      message: `frame 1 of the channel right is no number (byte 56: ${found})`,
      details: { offset: 56, found },
    });
    await expect(wav.read(2, 1)).rejects.toMatchObject({ details: { offset: 60 } });
    expect(await wav.read(0, 1)).toEqual([Float64Array.of(0.5), Float64Array.of(0.5)]);
  });
});

describe('a file that changes while it is read', () => {
  it('says so when bytes are missing that were there before', async () => {
    const bytes = plainWav();
    const wav = await openWav({
      sizeBytes: bytes.length,
      read: (offset, length) =>
        Promise.resolve(offset < 44 ? bytes.subarray(offset, offset + length) : new Uint8Array(3)),
    });
    await expect(wav.read(0, 4)).rejects.toMatchObject({
      code: 'WAV_CHANGED_WHILE_READ',
      details: { offset: 47 },
    });
  });

  it('passes on what the file system says', async () => {
    const fault = new Error('input/output error');
    await expect(openWav({ sizeBytes: 100, read: () => Promise.reject(fault) })).rejects.toBe(fault);
  });
});
