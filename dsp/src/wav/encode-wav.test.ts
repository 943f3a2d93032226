import { describe, expect, it } from 'vitest';
import vectors from '../../../test-vectors/wav/wav-format.json' with { type: 'json' };
import { openMemorySource } from '../source/open-memory-source.js';
import { createWavEncoder, encodeWav, encodeWavBlocks } from './create-wav-encoder.js';
import { openWav } from './open-wav.js';
import { bytesFromMemory } from './random-access-bytes.js';

const plain = { sampleRateHz: 48_000, bits: 16, dither: 'none', seed: 0 } as const;
const reopen = (file: Uint8Array) => openWav(bytesFromMemory(file));
const ramp = (length: number): Float64Array => Float64Array.from({ length }, (_, n) => n / length - 0.5);

describe('quantising', () => {
  it('rounds half up, and limits to the codes there are', () => {
    const lsb = 2 ** -15;
    const samples = Float64Array.of(0.5 * lsb, -0.5 * lsb, 0.49 * lsb, -0.51 * lsb, 1, 2, -1, -3);
    const encoder = createWavEncoder({ ...plain, channelCount: 1, frameCount: 8 });
    const codes = new Int16Array(encoder.block([samples]).slice().buffer);
    expect(Array.from(codes)).toEqual([1, 0, 0, -1, 32767, 32767, -32768, -32768]);
    expect(encoder.saturatedCount).toBe(3); // 1, 2 and -3; -1 is a code
  });

  it('dithers with the mean of the signal and the variance of TPDF: the total error has 1/4 LSB²', () => {
    // Lipshitz, Wannamaker and Vanderkooy 1992: with TPDF dither of 2 LSB the total error has the variance 3/12 LSB²
    // and mean 0, whatever the signal.
    const length = 200_000;
    for (const level of [0, 0.25, 0.5]) {
      const options = { ...plain, dither: 'tpdf', seed: 5, channelCount: 1, frameCount: length } as const;
      const bytes = createWavEncoder(options).block([new Float64Array(length).fill(level * 2 ** -15)]);
      const errors = Float64Array.from(new Int16Array(bytes.slice().buffer), (code) => code - level);
      const mean = errors.reduce((sum, error) => sum + error, 0) / length;
      const square = errors.reduce((sum, error) => sum + error * error, 0) / length;
      expect(Math.abs(mean)).toBeLessThan(0.005); // four times 0.5 / √200,000
      expect(Math.abs(square - 0.25)).toBeLessThan(0.004); // some four standard deviations of the estimate
    }
  });

  it('dithers each channel on its own, the same for the same seed', () => {
    const silence = new Float64Array(5000);
    const file = (seed: number): Uint8Array =>
      encodeWav([silence, silence], { ...plain, dither: 'tpdf', seed });
    const codes = new Int16Array(file(1).slice(44).buffer);
    const left = codes.filter((_, n) => n % 2 === 0);
    const right = codes.filter((_, n) => n % 2 === 1);
    const power = left.reduce((sum, code) => sum + code * code, 0);
    const product = left.reduce((sum, code, n) => sum + code * right[n], 0);
    expect(Math.abs(product / power)).toBeLessThan(0.06); // four times 1 / √5000
    expect(file(1)).toEqual(file(1));
    expect(file(1)).not.toEqual(file(2));
  });

  it('gives the same bytes however the samples are cut into blocks', async () => {
    const channels = [ramp(1001), ramp(1001).reverse()];
    const options = { ...plain, bits: 24, dither: 'tpdf', seed: 9 } as const;
    const whole = encodeWav(channels, options);
    const encoder = createWavEncoder({ ...options, channelCount: 2, frameCount: 1001 });
    const parts = [encoder.header()];
    for (let n = 0; n < 1001; n += 77) {
      parts.push(encoder.block(channels.map((samples) => samples.subarray(n, n + 77))));
    }
    expect(encoder.framesLeft).toBe(0);
    expect(Uint8Array.from(parts.flatMap((part) => Array.from(part)))).toEqual(whole);
    const streamed: number[] = [];
    for await (const part of encodeWavBlocks(openMemorySource(channels, 48_000), options)) {
      streamed.push(...part);
    }
    expect(Uint8Array.from(streamed)).toEqual(whole);
  });
});

describe('the file around the samples', () => {
  it('ends an odd data chunk with a pad byte that the RIFF size counts', async () => {
    const file = encodeWav([ramp(3)], { ...plain, bits: 24 });
    expect(file).toHaveLength(44 + 9 + 1);
    expect(new DataView(file.buffer).getUint32(4, true)).toBe(file.length - 8);
    expect((await reopen(file)).warnings).toEqual([]);
  });

  it.each([
    { bits: 16, channelCount: 2, tag: 1, header: 44 },
    { bits: 24, channelCount: 2, tag: 1, header: 44 },
    { bits: '32f', channelCount: 1, tag: 3, header: 58 },
    { bits: '32f', channelCount: 3, tag: 0xfffe, header: 80 },
    { bits: 24, channelCount: 8, tag: 0xfffe, header: 80 },
  ] as const)('of $bits bits and $channelCount channels has the format tag $tag', async (file) => {
    const { bits, channelCount, tag, header } = file;
    const bytes = encodeWav(
      Array.from({ length: channelCount }, () => ramp(4)),
      { ...plain, bits },
    );
    expect(new DataView(bytes.buffer).getUint16(20, true)).toBe(tag);
    const wav = await reopen(bytes);
    expect(wav).toMatchObject({ dataOffset: header, frameCount: 4, channelCount, warnings: [] });
    expect(wav.format.channelMask).toBe(tag === 0xfffe ? 0 : null);
  });

  it('refuses what no file can state', () => {
    const refusal = expect.objectContaining({ name: 'DspInputError', code: 'BAD_ARGUMENT' });
    expect(() => encodeWav([], plain)).toThrow(refusal);
    expect(() => encodeWav([new Float64Array()], plain)).toThrow(refusal);
    expect(() => encodeWav([ramp(3), ramp(4)], plain)).toThrow(refusal);
    expect(() => encodeWav([ramp(3)], { ...plain, sampleRateHz: 44_100.5 })).toThrow(refusal);
    expect(() => encodeWav([ramp(3)], { ...plain, sampleRateHz: 10 })).toThrow(refusal);
    expect(() => encodeWav([ramp(3)], { ...plain, seed: -1 })).toThrow(refusal);
    expect(() =>
      encodeWav(
        Array.from({ length: 33 }, () => ramp(1)),
        plain,
      ),
    ).toThrow(refusal);
    const encoder = createWavEncoder({ ...plain, channelCount: 1, frameCount: 2 });
    expect(() => encoder.block([ramp(3)])).toThrow(refusal);
    expect(() => encoder.block([ramp(1), ramp(1)])).toThrow(refusal);
    expect(() => encoder.block([Float64Array.of(0, NaN)])).toThrow(
      expect.objectContaining({ code: 'NON_FINITE_SAMPLE' }),
    );
  });
});

describe('the bext chunk', () => {
  const broadcast = {
    description: 'Loop of the recorder, no unit — 997 Hz',
    originator: 'The bench',
    originatorReference: 'B-0017',
    originationDate: '2031-04-05',
    originationTime: '06:07:08',
    timeReferenceFrames: 2 ** 33 + 5,
    umid: 'ab'.repeat(64),
    loudness: {
      integratedLufs: -23.01,
      rangeLu: 4.5,
      maxTruePeakDbtp: -1,
      maxMomentaryLufs: null,
      maxShortTermLufs: -Infinity,
    },
    codingHistory: 'A=PCM,F=48000,W=16,M=mono\nA=PCM,F=48000,W=24,M=mono\n',
  };
  const file = encodeWav([ramp(4)], { ...plain, broadcast });
  const start = 20;
  const view = new DataView(file.buffer);
  const at = (name: string): { offset: number; bytes: number } => {
    const row = vectors.bext.find((field) => field.name === name)!;
    return { ...row, offset: row.offset + start };
  };
  const textOf = (name: string): string => {
    const { offset, bytes } = at(name);
    return String.fromCharCode(...file.subarray(offset, offset + bytes)).replace(/\0+$/, '');
  };

  it('stands where EBU Tech 3285 puts each field', () => {
    expect(String.fromCharCode(...file.subarray(12, 16))).toBe('bext');
    expect(textOf('description')).toBe('Loop of the recorder, no unit ? 997 Hz');
    expect(textOf('originator')).toBe('The bench');
    expect(textOf('originatorReference')).toBe('B-0017');
    expect(textOf('originationDate')).toBe('2031-04-05');
    expect(textOf('originationTime')).toBe('06:07:08');
    expect(view.getBigUint64(at('timeReference').offset, true)).toBe(8589934597n);
    expect(view.getUint16(at('version').offset, true)).toBe(2);
    expect(file[at('umid').offset + 63]).toBe(0xab);
    expect(view.getInt16(at('loudnessValue').offset, true)).toBe(-2301);
    expect(view.getInt16(at('loudnessRange').offset, true)).toBe(450);
    expect(view.getInt16(at('maxTruePeakLevel').offset, true)).toBe(-100);
    expect(view.getInt16(at('maxMomentaryLoudness').offset, true)).toBe(0x7fff);
    expect(view.getInt16(at('maxShortTermLoudness').offset, true)).toBe(0x7fff);
    const { offset, bytes } = at('reserved');
    expect(file.subarray(offset, offset + bytes).every((byte) => byte === 0)).toBe(true);
    expect(view.getUint8(at('codingHistory').offset)).toBe('A'.charCodeAt(0));
  });

  it('comes back as it went in, short of letters beyond ASCII', async () => {
    const wav = await reopen(file);
    expect(wav.warnings).toEqual([]);
    expect(wav.broadcast).toEqual({
      ...broadcast,
      description: 'Loop of the recorder, no unit ? 997 Hz',
      version: 2,
      loudness: { ...broadcast.loudness, maxShortTermLufs: null },
      codingHistory: broadcast.codingHistory.trim(),
    });
  });

  it('is of version 1 and empty where nothing is given', async () => {
    const wav = await reopen(encodeWav([ramp(4)], { ...plain, broadcast: {} }));
    expect(wav.broadcast).toMatchObject({
      version: 1,
      loudness: null,
      umid: null,
      description: '',
      timeReferenceFrames: 0,
    });
  });

  it('of a stranger loses control characters and shows what is no ASCII', async () => {
    const altered = file.slice();
    altered.set([0x1b, 0x5b, 0x41, 0xfc, 0x07, 0x42, 0x00, 0x43], start);
    altered.fill(0xff, at('timeReference').offset, at('timeReference').offset + 8);
    const wav = await reopen(altered);
    expect(wav.broadcast).toMatchObject({ description: '[A\ufffdB', timeReferenceFrames: null });
  });

  it.each([
    { originationDate: '5.4.2031' },
    { originationTime: '6:07' },
    { umid: 'zz' },
    { timeReferenceFrames: -1 },
    { timeReferenceFrames: 0.5 },
  ])('refuses %o', (wrong) => {
    expect(() => encodeWav([ramp(4)], { ...plain, broadcast: wrong })).toThrow(
      expect.objectContaining({ code: 'BAD_ARGUMENT' }),
    );
  });
});
