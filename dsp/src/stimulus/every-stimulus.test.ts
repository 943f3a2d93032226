import { describe, expect, it } from 'vitest';
import { createTruePeakMeter } from '../level/create-true-peak-meter.js';
import { createRealFft } from '../spectrum/create-real-fft.js';
import { fitSine } from '../tone/fit-sine.js';
import { encodeWavBlocks } from '../wav/create-wav-encoder.js';
import { openWav } from '../wav/open-wav.js';
import { bytesFromMemory } from '../wav/random-access-bytes.js';
import { createStimulus } from './create-stimulus.js';
import { parseDescriptor } from './parse-descriptor.js';
import { standardDescriptor } from './standard-descriptor.js';
import { markCodeOf } from './mark-codes.js';
import { STIMULUS_KINDS, STIMULUS_NAMES } from './stimulus-kinds.js';
import { planSweep, sweepDurationS } from './sweep-signal.js';

const PLAIN = { sampleRateHz: 48_000, bitsPerSample: 24 } as const;
const RATES_HZ = [44_100, 48_000, 88_200, 96_000, 176_400, 192_000] as const;

async function render(...call: Parameters<typeof createStimulus>) {
  const stimulus = createStimulus(...call);
  const channels = await stimulus.source.read(0, stimulus.source.frameCount);
  return { stimulus, channels, descriptor: stimulus.describe('') };
}

async function written(...call: Parameters<typeof createStimulus>) {
  const { source, encoding, describe: describeFile } = createStimulus(...call);
  const blocks: Uint8Array[] = [];
  for await (const block of encodeWavBlocks(source, encoding)) blocks.push(block);
  const file = new Uint8Array(blocks.reduce((sum, { length }) => sum + length, 0));
  let at = 0;
  for (const block of blocks) {
    file.set(block, at);
    at += block.length;
  }
  const wav = await openWav(bytesFromMemory(file));
  return { channels: await wav.read(0, wav.frameCount), descriptor: describeFile('') };
}

function cut(samples: Float64Array, rate: number, { fromS, toS }: { fromS: number; toS: number }) {
  return samples.slice(Math.ceil(fromS * rate - 1e-6), Math.floor(toS * rate + 1e-6));
}

function peakOf(samples: Float64Array): number {
  return samples.reduce((peak, x) => Math.max(peak, Math.abs(x)), 0);
}

function rmsOf(samples: Float64Array): number {
  return Math.sqrt(samples.reduce((sum, x) => sum + x * x, 0) / samples.length);
}

const db = (ratio: number): number => 20 * Math.log10(ratio);

describe.each(STIMULUS_NAMES)('the stimulus %s', (name) => {
  const form = name === 'programme' ? { isQuick: true } : {};

  it('keeps every sample under a ceiling, and says so in its parts', async () => {
    const { channels, descriptor } = await render(name, { ...PLAIN, ...form, ceilingDbfs: -20 });
    // The ceiling is of a sine's peak; noise, the square and the tone between samples go beyond theirs by their crest.
    const crestDb = { 'white-noise': 1.77, 'pink-noise': 11, square: 1.5 }[name] ?? 1e-6;
    for (const samples of channels) expect(db(peakOf(samples))).toBeLessThanOrEqual(-20 + crestDb);
    const levels = descriptor.parts.flatMap(({ steps }) => steps.map(({ levelDbfs }) => levelDbfs));
    expect(Math.max(-999, ...levels)).toBeLessThanOrEqual(-20 + 0.001);
  });

  it('comes out alike however it is cut into runs', async () => {
    const { stimulus, channels } = await render(name, { ...PLAIN, ...form });
    const { frameCount } = stimulus.source;
    for (const [from, count] of [
      [Math.floor(frameCount / 3), 5000],
      [Math.floor(frameCount / 2), 777],
      [frameCount - 3, 100],
    ]) {
      const run = await stimulus.source.read(from, count);
      run.forEach((samples, c) => {
        expect(samples.every((x, n) => x === channels[c][from + n])).toBe(true);
      });
    }
  });

  it('has a descriptor that can be read back, whose parts lie in the file between its marks', async () => {
    const { descriptor } = await render(name, { ...PLAIN, ...form });
    const { marks, parts } = descriptor;
    expect(parseDescriptor(JSON.parse(JSON.stringify(descriptor)))).toEqual(descriptor);
    parts.forEach(({ fromS, toS, steps }, index) => {
      expect(fromS).toBeGreaterThanOrEqual(parts[index - 1]?.toS ?? marks[1]?.atS ?? 0);
      expect(toS).toBeLessThanOrEqual(marks[2]?.atS ?? descriptor.frameCount / 48_000);
      steps.forEach((step, at) => {
        expect(step.fromS).toBeGreaterThanOrEqual(steps[at - 1]?.toS ?? fromS);
      });
    });
  });

  it('is described by its marks as by its own descriptor', async () => {
    const { descriptor } = await render(name, { ...PLAIN, ...form });
    if (descriptor.marks.length === 0) return;
    const told = standardDescriptor(markCodeOf(name, 48_000, name === 'programme'));
    expect(told?.parts.map(({ measure, fromS, toS }) => ({ measure, fromS, toS }))).toEqual(
      descriptor.parts.map(({ measure, fromS, toS }) => ({ measure, fromS, toS })),
    );
    expect(told?.marks).toEqual(descriptor.marks);
  });
});

describe('steps', () => {
  it('hold one tone in one phase at each level of the ladder', async () => {
    const { channels, descriptor } = await render('level-steps', PLAIN);
    const [{ steps }] = descriptor.parts;
    expect(steps.map(({ levelDbfs }) => levelDbfs)).toEqual([
      ...[0, -0.5, -1, -1.5, -2, -2.5, -3, -4, -5, -6, -7, -8, -9, -10, -12, -15],
      ...Array.from({ length: 21 }, (_, k) => -20 - 5 * k),
    ]);
    for (const step of steps) {
      expect(step.toS - step.fromS).toBeGreaterThan(step.levelDbfs < -90 ? 1.4 : 0.5);
      const fit = fitSine(cut(channels[0], 48_000, step), 48_000, 997);
      // A full-scale tone keeps two steps of 24 bits off the end of the scale: 2e-6 dB.
      expect(db(fit.amplitude)).toBeCloseTo(step.levelDbfs, 5);
      expect(fit.frequencyHz).toBeCloseTo(997, 6);
    }
  });

  it('go from level to level without a click: nothing beyond -90 dB of the tone 3 kHz away', async () => {
    const { channels, descriptor } = await render('level-steps', { ...PLAIN, isBare: true });
    const [{ steps }] = descriptor.parts;
    const length = 16_384;
    const middle = Math.round(steps[15].toS * 48_000);
    const piece = channels[0].slice(middle - length / 2, middle + length / 2);
    piece.forEach((x, n) => {
      piece[n] = x * (0.5 - 0.5 * Math.cos((2 * Math.PI * n) / length)) ** 2;
    });
    const re = new Float64Array(length / 2 + 1);
    const im = new Float64Array(length / 2 + 1);
    createRealFft(length).transform(piece, re, im);
    const size = re.map((x, k) => Math.hypot(x, im[k]));
    expect(db(peakOf(size.slice(Math.ceil((4000 * length) / 48_000))) / peakOf(size))).toBeLessThan(-90);
  });

  it.each([
    { name: 'modulation-pair', low: 60, high: 7000, share: 0.8 },
    { name: 'difference-pair', low: 19_000, high: 20_000, share: 0.5 },
  ])('$name is two tones whose peaks add up to the level', async ({ name, low, high, share }) => {
    const { channels, descriptor } = await render(name, PLAIN);
    const [part] = descriptor.parts;
    const body = cut(channels[0], 48_000, { fromS: part.fromS, toS: part.fromS + 1 });
    const amplitudeOf = (f: number): number => {
      let [re, im] = [0, 0];
      body.forEach((x, n) => {
        re += x * Math.cos((2 * Math.PI * f * n) / 48_000);
        im += x * Math.sin((2 * Math.PI * f * n) / 48_000);
      });
      return (2 * Math.hypot(re, im)) / body.length;
    };
    // One second holds whole periods of both.
    expect(amplitudeOf(low)).toBeCloseTo(share * 10 ** (-1 / 20), 9);
    expect(amplitudeOf(high)).toBeCloseTo((1 - share) * 10 ** (-1 / 20), 9);
  });
});

describe('the sweep', () => {
  // Constants of a published table: Novak, Lotton and Simon 2010's rule L = round(f1 T / ln(f2/f1)) / f1.
  it.each([
    [20, 20_000, 5, 0.7, 4.835429],
    [20, 20_000, 10, 1.45, 10.016245],
    [10, 22_000, 10, 1.3, 10.005076],
    [10, 45_000, 10, 1.2, 10.094199],
    [20, 40_000, 10, 1.3, 9.881173],
  ])('from %d to %d Hz in about %d s has L = %d s', (low, high, wanted, rateS, durationS) => {
    const sweep = planSweep(low, high, wanted, { fadeInS: 0, fadeOutS: 0 });
    expect(sweep.rateS).toBeCloseTo(rateS, 12);
    expect(sweepDurationS(sweep)).toBeCloseTo(durationS, 6);
  });

  it.each(RATES_HZ)('at %d Hz goes from below 10 Hz to beyond 0.47 of the rate in about 8 s', (rate) => {
    const [part] = createStimulus('sweep', { ...PLAIN, sampleRateHz: rate }).describe('').parts;
    const { lowHz, highHz, rateS, fadeInS, fadeOutS } = part.parameters as Record<string, number>;
    expect(lowHz).toBeLessThanOrEqual(10);
    expect(highHz * Math.exp(-fadeOutS / rateS)).toBeGreaterThanOrEqual(0.47 * rate);
    // Faded in by 10 Hz: the band from there is at full level.
    expect(lowHz * Math.exp(fadeInS / rateS)).toBeLessThan(10);
    expect(Math.abs(part.toS - part.fromS - 8)).toBeLessThan(0.7);
  });
});

describe('the exact pattern', () => {
  const words = {
    16: { scale: 2 ** 15, first: [0xc000, 0xc000, 0x4000, 0x4000], second: [0xbfff, 0xbfff, 0x3fff, 0x3fff] },
    24: {
      scale: 2 ** 23,
      first: [0xc00000, 0xc00000, 0x400000, 0x400000],
      second: [0xbfffff, 0xbfffff, 0x3fffff, 0x3fffff],
    },
  };

  // Words: Dunn and Dennis, 96th AES Convention, 1994 (24 bits, seen in a quotation; 16 bits by the same rule).
  it.each([
    { name: 'jitter-test', bits: 16 },
    { name: 'jitter-test', bits: 24 },
    { name: 'programme', bits: 16 },
    { name: 'programme', bits: 24 },
  ] as const)('stands in the $bits bits of $name to the last bit', async ({ name, bits }) => {
    const quick = name === 'programme' ? { isQuick: true } : {};
    const { channels, descriptor } = await written(name, { ...PLAIN, bitsPerSample: bits, ...quick });
    const part = descriptor.parts.find(({ measure }) => measure === 'jitter')!;
    const { scale, first, second } = words[bits];
    const period = [...Array(24).fill(first).flat(), ...Array(24).fill(second).flat()] as number[];
    for (const samples of channels) {
      const body = cut(samples, 48_000, part);
      expect(body.length).toBeGreaterThan(90_000);
      const codes = body.map((x) => (x * scale + 2 * scale) % (2 * scale));
      expect(codes.every((code, n) => code === period[n % 192])).toBe(true);
    }
  });
});

describe('tones between samples and many tones', () => {
  it('the first step has samples at full scale and a wave 3.01 dB beyond', async () => {
    const { channels, descriptor } = await render('intersample-tone', PLAIN);
    const [{ steps }] = descriptor.parts;
    const [high, low] = steps.map((step) => cut(channels[0], 48_000, step));
    expect(db(peakOf(high))).toBeCloseTo(0, 5);
    expect(db(peakOf(low))).toBeCloseTo(-6, 5);
    const meter = createTruePeakMeter(48_000);
    meter.push(low);
    // EBU Tech 3341 (2023), cases 15 to 19: +0.2/-0.4 dB is what a meter of true peak may be off.
    expect(db(meter.read()) - (-6 + 3.0103)).toBeGreaterThan(-0.4);
    expect(db(meter.read()) - (-6 + 3.0103)).toBeLessThan(0.2);
  });

  it.each([44_100, 96_000])('multitone at %d Hz keeps its peak under the level', async (rate) => {
    const { channels, descriptor } = await render('multitone', { ...PLAIN, sampleRateHz: rate });
    const [part] = descriptor.parts;
    const peakDb = db(peakOf(cut(channels[0], rate, part)));
    expect(peakDb).toBeLessThanOrEqual(-1);
    // The ramps at the ends may hold the peak.
    expect(peakDb).toBeGreaterThan(-1.5);
    const { lowestHz, toneCount, tonesPerDecade } = part.parameters as Record<string, number>;
    // IEC 61260-1:2014, base ten: 19.953 Hz is the exact mid-frequency of the 20 Hz band.
    expect(lowestHz).toBeCloseTo(19.9526, 4);
    const highest = lowestHz * 10 ** ((toneCount - 1) / tonesPerDecade);
    expect(highest).toBeLessThanOrEqual(0.45 * rate);
    expect(highest * 10 ** 0.1).toBeGreaterThan(0.45 * rate);
  });
});

describe('noise and the square', () => {
  const octavePower = (samples: Float64Array, lowHz: number): number => {
    const length = 65_536;
    const re = new Float64Array(length / 2 + 1);
    const im = new Float64Array(length / 2 + 1);
    const fft = createRealFft(length);
    let power = 0;
    for (let from = 0; from + length <= samples.length; from += length) {
      fft.transform(samples.slice(from, from + length), re, im);
      const bin = (hz: number) => Math.round((hz * length) / 48_000);
      for (let k = bin(lowHz); k < bin(2 * lowHz); k++) power += re[k] ** 2 + im[k] ** 2;
    }
    return 10 * Math.log10(power);
  };

  it.each(['white-noise', 'pink-noise', 'square'])(
    '%s has -10 dBFS RMS and no clipped sample',
    async (name) => {
      const { channels, descriptor } = await render(name, PLAIN);
      const body = cut(channels[0], 48_000, descriptor.parts[0]);
      // 10 s of white noise know their power to 0.01 dB.
      expect(Math.abs(db(rmsOf(body) * Math.SQRT2) + 10)).toBeLessThan(0.03);
      expect(peakOf(body)).toBeLessThan(1);
    },
  );

  it('white noise doubles its power every octave, pink noise keeps it', async () => {
    const [white, pink] = await Promise.all(
      ['white-noise', 'pink-noise'].map(async (name) => {
        const { channels, descriptor } = await render(name, PLAIN);
        return cut(channels[0], 48_000, descriptor.parts[0]);
      }),
    );
    for (const lowHz of [200, 800, 3200]) {
      // Some thousand bins and seven records: 0.1 dB; the pink lines are fixed but for leakage.
      expect(Math.abs(octavePower(white, 2 * lowHz) - octavePower(white, lowHz) - 3.0103)).toBeLessThan(0.3);
      expect(Math.abs(octavePower(pink, 2 * lowHz) - octavePower(pink, lowHz))).toBeLessThan(0.3);
    }
  });

  it('the square has odd harmonics at 1/n and nothing folded back', async () => {
    const { channels, descriptor } = await render('square', { ...PLAIN, frequencyHz: 1000 });
    const body = cut(channels[0], 48_000, { ...descriptor.parts[0], toS: descriptor.parts[0].fromS + 1 });
    const fundamental = fitSine(body, 48_000, 1000).amplitude;
    let sum = 0;
    for (let n = 1; n <= 21; n += 2) sum += (fundamental / n) ** 2 / 2;
    // Closed form: the harmonics' powers are all there is (Parseval); one second holds whole periods.
    expect(rmsOf(body) ** 2 / sum).toBeCloseTo(1, 6);
  });
});

describe('the programme', () => {
  it.each(RATES_HZ)('lasts at most 120 s, quick at most 30 s, at %d Hz', (sampleRateHz) => {
    const full = createStimulus('programme', { ...PLAIN, sampleRateHz });
    const quick = createStimulus('programme', { ...PLAIN, sampleRateHz, isQuick: true });
    expect(full.source.frameCount / sampleRateHz).toBeLessThanOrEqual(120);
    expect(quick.source.frameCount / sampleRateHz).toBeLessThanOrEqual(30);
  });

  it('holds every measure of a stimulus once, the sweep in each channel alone again', () => {
    const { parts } = createStimulus('programme', PLAIN).describe('');
    const measures = new Set(parts.map(({ measure }) => measure));
    const wanted = STIMULUS_KINDS.map(({ measure }) => measure).filter(
      (id) => id !== 'programme' && id !== 'loudness',
    );
    expect(measures).toEqual(new Set(wanted));
    expect(parts.filter(({ measure }) => measure === 'separation').map(({ channels }) => channels)).toEqual([
      'left',
      'right',
    ]);
  });

  it('is silent in the other channel while one is driven alone', async () => {
    const { channels, descriptor } = await render('separation', PLAIN);
    const [left, right] = descriptor.parts;
    expect(peakOf(cut(channels[1], 48_000, left))).toBe(0);
    expect(peakOf(cut(channels[0], 48_000, right))).toBe(0);
    expect(db(peakOf(cut(channels[0], 48_000, left)))).toBeCloseTo(-10, 2);
  });
});

describe('what a stimulus does not take', () => {
  it.each([
    ['sweep', { frequencyHz: 1000 }, 'frequency'],
    ['level-steps', { durationS: 3 }, 'duration'],
    ['jitter-test', { levelDbfs: -3 }, 'level'],
    ['jitter-test', { dither: 'tpdf' }, 'dither'],
    ['separation', { channels: 'left' }, 'channels'],
    ['white-noise', { levelDbfs: -3 }, 'level'],
    ['modulation-pair', { lowFrequencyHz: 8000 }, 'high frequency'],
    ['sine', { isQuick: true }, 'short form'],
  ] as const)('%s refuses %o', (name, options, word) => {
    const call = () => createStimulus(name, { ...PLAIN, ...options });
    expect(call).toThrow(expect.objectContaining({ code: 'OUT_OF_RANGE' }));
    expect(call).toThrow(word);
  });
});
