import { describe, expect, it } from 'vitest';
import { createRealFft } from '../spectrum/create-real-fft.js';
import { fitSine } from '../tone/fit-sine.js';
import { encodeWav } from '../wav/create-wav-encoder.js';
import { openWav } from '../wav/open-wav.js';
import { createStimulus } from './create-stimulus.js';
import type { StimulusDescriptor } from './descriptor.js';
import { MARK_CODES, markCodeOf, namedByMarkCode } from './mark-codes.js';
import { STIMULUS_NAMES } from './stimulus-kinds.js';

const PLAIN = { sampleRateHz: 48_000, bitsPerSample: 24 } as const;

async function render(...call: Parameters<typeof createStimulus>) {
  const stimulus = createStimulus(...call);
  const channels = await stimulus.source.read(0, stimulus.source.frameCount);
  return { channels, descriptor: stimulus.describe('') };
}

function bodyOf(samples: Float64Array, { parts, sampleRateHz }: StimulusDescriptor): Float64Array {
  return samples.slice(Math.ceil(parts[0].fromS * sampleRateHz), Math.floor(parts[0].toS * sampleRateHz));
}

function peakOf(samples: Float64Array): number {
  return samples.reduce((peak, x) => Math.max(peak, Math.abs(x)), 0);
}

describe('the tones', () => {
  it.each([
    { name: 'sine', rate: 44_100, level: -1 },
    { name: 'sine', rate: 192_000, level: -1 },
    { name: 'low-level-tone', rate: 96_000, level: -60 },
  ])('$name at $rate Hz is 997 Hz at $level dBFS to the last', async ({ name, rate, level }) => {
    const { channels, descriptor } = await render(name, { ...PLAIN, sampleRateHz: rate });
    // The last second: a phase that lost its accuracy on the way would show there.
    const fit = fitSine(bodyOf(channels[0], descriptor).slice(-rate), rate, 997.01);
    // AES17: 0 dBFS is a sine whose peak reaches full scale. The fit itself is good to about 1e-12.
    expect(20 * Math.log10(fit.amplitude)).toBeCloseTo(level, 9);
    expect(fit.frequencyHz).toBeCloseTo(997, 7);
    expect(Math.abs(fit.offset)).toBeLessThan(1e-12);
    expect(channels[1].every((x, n) => x === channels[0][n])).toBe(true);
    expect(descriptor.parts[0].steps[0].levelDbfs).toBe(level);
  });

  it('takes frequency, level, duration and channel, and says so', async () => {
    const { channels, descriptor } = await render('sine', {
      ...PLAIN,
      frequencyHz: 11_025.5,
      levelDbfs: -6,
      durationS: 1,
      channels: 'right',
      isBare: true,
      seed: 7,
    });
    expect(channels[1]).toHaveLength(48_000);
    expect(peakOf(channels[0])).toBe(0);
    const fit = fitSine(bodyOf(channels[1], descriptor), 48_000, 11_025);
    expect(fit.frequencyHz).toBeCloseTo(11_025.5, 7);
    expect(20 * Math.log10(fit.amplitude)).toBeCloseTo(-6, 9);
    expect(descriptor).toMatchObject({
      parameters: { frequencyHz: 11_025.5, levelDbfs: -6, durationS: 1 },
      channels: 'right',
      seed: 7,
      marks: [],
    });
  });

  it('keeps every level under the ceiling, lead-in and marks too', async () => {
    const { channels, descriptor } = await render('sine', { ...PLAIN, ceilingDbfs: -50, durationS: 1 });
    expect(20 * Math.log10(peakOf(channels[0]))).toBeLessThanOrEqual(-50 + 1e-9);
    expect(descriptor.parameters).toMatchObject({ levelDbfs: -50, ceilingDbfs: -50 });
  });

  it.each([16, 24] as const)('a full-scale tone at %i bits with dither saturates nowhere', async (bits) => {
    const { channels } = await render('sine', { ...PLAIN, bitsPerSample: bits, levelDbfs: 0, isBare: true });
    const file = encodeWav(channels, { sampleRateHz: 48_000, bits, dither: 'tpdf', seed: 1 });
    const wav = await openWav({
      sizeBytes: file.length,
      read: (from, count) => Promise.resolve(file.slice(from, from + count)),
    });
    const [read] = await wav.read(0, wav.frameCount);
    const lsb = 2 ** (1 - bits);
    expect(peakOf(read)).toBeLessThanOrEqual(1 - lsb);
    // TPDF: error variance 1/4 LSB² (Lipshitz, Wannamaker and Vanderkooy, JAES 40(5), 1992); ±5 of its own deviations.
    const square = read.reduce((sum, x, n) => sum + ((x - channels[0][n]) / lsb) ** 2, 0) / read.length;
    expect(Math.abs(square - 0.25)).toBeLessThan(0.0025);
  });
});

describe('the file around the body', () => {
  it('is left out of a bare file: 10 s and no frame more', () => {
    expect(createStimulus('sine', { ...PLAIN, isBare: true }).source.frameCount).toBe(480_000);
  });

  it('begins with 2 s of 997 Hz at -40 dBFS', async () => {
    const { channels } = await render('sine', PLAIN);
    const fit = fitSine(channels[0].slice(2000, 94_000), 48_000, 997);
    expect(20 * Math.log10(fit.amplitude)).toBeCloseTo(-40, 6);
    expect(peakOf(channels[0].slice(96_000, 100_000))).toBe(0);
  });

  it.each([
    { name: 'sine', options: {}, gapS: 0.31 },
    { name: 'sine', options: { levelDbfs: -12 }, gapS: 0.31 },
    { name: 'low-level-tone', options: {}, gapS: 0.32 },
    { name: 'low-level-tone', options: { levelDbfs: -50 }, gapS: 0.93 },
    { name: 'sine', options: { frequencyHz: 1000 }, gapS: 0.93 },
    { name: 'sine', options: { durationS: 9 }, gapS: 0.93 },
    { name: 'sine', options: { channels: 'left' }, gapS: 0.93 },
  ] as const)('$name with $options has marks $gapS s apart', async ({ name, options, gapS }) => {
    const { descriptor } = await render(name, { ...PLAIN, ...options });
    const at = descriptor.marks.map(({ atS }) => atS);
    expect(descriptor.marks.map(({ kind }) => kind)).toEqual(['start', 'start', 'end', 'end']);
    expect(at[1] - at[0]).toBeCloseTo(gapS, 12);
    expect(at[3] - at[2]).toBeCloseTo(gapS, 12);
    expect(at[0]).toBeGreaterThan(2);
    expect(at[1]).toBeLessThan(descriptor.parts[0].fromS);
    expect(at[2]).toBeGreaterThan(descriptor.parts[0].toS);
  });

  it('has marks of 60 ms from 2 to 6 kHz at -20 dBFS', async () => {
    const { channels, descriptor } = await render('sine', PLAIN);
    const from = Math.round(descriptor.marks[0].atS * 48_000);
    const mark = channels[0].slice(from, from + 2880);
    expect(20 * Math.log10(peakOf(mark))).toBeCloseTo(-20, 1);
    expect(peakOf(channels[0].slice(from - 100, from))).toBe(0);
    expect(peakOf(channels[0].slice(from + 2880, from + 2980))).toBe(0);
    // Cycles between zero crossings, 10 ms from each end: 2 kHz + 66.7 kHz/s · t.
    const crossings = (part: Float64Array) =>
      part.reduce((n, x, k) => n + (k > 0 && part[k - 1] < 0 && x >= 0 ? 1 : 0), 0);
    expect(crossings(mark.slice(480, 960)) / 0.01).toBeGreaterThan(2800);
    expect(crossings(mark.slice(480, 960)) / 0.01).toBeLessThan(3200);
    expect(crossings(mark.slice(1920, 2400)) / 0.01).toBeGreaterThan(4800);
    expect(crossings(mark.slice(1920, 2400)) / 0.01).toBeLessThan(5200);
  });

  it('clicks nowhere: a rise spreads less than -100 dB of the tone beyond 2 kHz away', async () => {
    const { channels, descriptor } = await render('sine', PLAIN);
    const rise = Math.round((descriptor.parts[0].fromS - 0.02) * 48_000);
    const length = 16_384;
    // Half of it silence, half tone; the far end falls with the same kind of ramp, so that cutting it out adds no step.
    const cut = channels[0].slice(rise - length / 2, rise + length / 2);
    for (let n = 0; n < 4096; n++) cut[length - 1 - n] *= 0.5 - 0.5 * Math.cos((Math.PI * n) / 4096);
    const re = new Float64Array(length / 2 + 1);
    const im = new Float64Array(length / 2 + 1);
    createRealFft(length).transform(cut, re, im);
    const size = re.map((x, k) => Math.hypot(x, im[k]));
    const tone = peakOf(size);
    const beyond = size.slice(Math.ceil((3000 * length) / 48_000));
    expect(20 * Math.log10(peakOf(beyond) / tone)).toBeLessThan(-100);
  });

  it('renders the same frames however they are cut into runs', async () => {
    const { source } = createStimulus('sine', { ...PLAIN, sampleRateHz: 44_100 });
    const [whole] = await source.read(0, source.frameCount);
    for (const [from, count] of [
      [0, 1],
      [92_000, 5000],
      [120_001, 777],
      [source.frameCount - 3, 100],
    ]) {
      const [run] = await source.read(from, count);
      expect([...run]).toEqual([...whole.slice(from, from + count)]);
    }
  });
});

describe('silence', () => {
  it('is digital zero for 10 s without marks or dither', async () => {
    const { channels, descriptor } = await render('silence', { ...PLAIN, bitsPerSample: 16 });
    expect(channels.map(peakOf)).toEqual([0, 0]);
    expect(channels[0]).toHaveLength(480_000);
    expect(descriptor).toMatchObject({ dither: 'none', marks: [], parameters: { durationS: 10 } });
    expect(descriptor.parts).toEqual([
      { measure: 'idle', channels: 'both', fromS: 0, toS: 10, parameters: {}, steps: [] },
    ]);
  });
});

describe('what is refused', () => {
  it('knows its names alone', () => {
    expect(STIMULUS_NAMES).toHaveLength(17);
    expect(() => createStimulus('sinus', PLAIN)).toThrow(expect.objectContaining({ code: 'UNKNOWN_NAME' }));
  });

  it.each([
    { options: { sampleRateHz: 22_050 }, names: 'sample rate' },
    { options: { sampleRateHz: 48_000.5 }, names: 'sample rate' },
    { options: { frequencyHz: 24_000 }, names: 'frequency' },
    { options: { frequencyHz: NaN }, names: 'frequency' },
    { options: { levelDbfs: 0.1 }, names: 'level' },
    { options: { ceilingDbfs: 1 }, names: 'ceiling' },
    { options: { durationS: 0 }, names: 'duration' },
    { options: { seed: -1 }, names: 'seed' },
    { options: { bitsPerSample: '32f', dither: 'tpdf' }, names: 'dither' },
  ] as const)('refuses $options', ({ options, names }) => {
    const call = () => createStimulus('sine', { ...PLAIN, ...options });
    expect(call).toThrow(expect.objectContaining({ code: 'OUT_OF_RANGE' }));
    expect(call).toThrow(names);
  });

  it('takes no tone for silence', () => {
    expect(() => createStimulus('silence', { ...PLAIN, frequencyHz: 1000 })).toThrow('frequency');
    expect(() => createStimulus('silence', { ...PLAIN, levelDbfs: -3 })).toThrow('level');
  });
});

describe('the numbers in the marks', () => {
  it('are given once each, below the number of other parameters', () => {
    const codes = [...MARK_CODES.keys()];
    expect(Math.max(...codes)).toBeLessThan(63);
    expect(codes).toHaveLength(57);
    for (const [code, { name, sampleRateHz, isQuick }] of MARK_CODES) {
      expect(markCodeOf(name, sampleRateHz ?? 50_000, isQuick)).toBe(code);
    }
    expect([namedByMarkCode(63), namedByMarkCode(60)]).toEqual([null, null]);
    expect(markCodeOf('sweep', 50_000, false)).toBe(63);
  });
});
