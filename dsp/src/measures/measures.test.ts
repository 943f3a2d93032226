import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { DspInputError } from '../errors.js';
import { compareRecords } from '../record/compare-records.js';
import { embedBaseline } from '../record/embed-baseline.js';
import { parseRecord } from '../record/parse-record.js';
import type { BenchRecord, Calibration } from '../record/record.js';
import { toRecordJson } from '../record/to-record-json.js';
import { mix, sine, synthesise, whiteNoise } from '../testing/signals.js';
import { openMemorySource } from '../source/open-memory-source.js';
import { recognise } from './recognise.js';
import { getMeasure, measures } from './registry.js';
import { analyseSamples, numberOf, warningCodes } from './testing/analyse-samples.js';

const RATE = 48000;
const tone = getMeasure('tone');
const noisyTone = (seconds: number, amplitude = 0.5): Float64Array =>
  mix(
    sine(RATE * seconds, RATE, 997, amplitude, 1),
    sine(RATE * seconds, RATE, 1994, amplitude * 1e-3, 2),
    whiteNoise(RATE * seconds, 1e-5, 7),
  );
const placed = (samples: Float64Array, before: number, after: number): Float64Array => {
  const whole = new Float64Array(before + samples.length + after);
  whole.set(samples, before);
  return whole;
};

describe('the steady part', () => {
  it.each([
    { name: 'silence before', before: 2, after: 0 },
    { name: 'a mute at the end', before: 0, after: 3 },
    { name: 'both, much longer than the tone', before: 12, after: 20 },
  ])('is found past $name', async ({ before, after }) => {
    const record = await analyseSamples(tone, [placed(noisyTone(3), before * RATE, after * RATE)], RATE);
    expect(record.settings.fromS).toBeGreaterThanOrEqual(before);
    expect(record.settings.toS).toBeLessThanOrEqual(before + 3);
    expect(record.settings.toS - record.settings.fromS).toBeGreaterThan(2.4);
    expect(numberOf(record.channels[0], 'thdDb')).toBeCloseTo(-60, 2);
    expect(numberOf(record.channels[0], 'fundamentalLevelDbfs')).toBeCloseTo(-6.0206, 3);
  });

  it('is the body, not a lead-in 39 dB lower, and neither is heard in the figures', async () => {
    const whole = new Float64Array(RATE * 9);
    whole.set(sine(RATE * 2, RATE, 997, 0.01), RATE);
    whole.set(noisyTone(4), RATE * 4);
    const record = await analyseSamples(tone, [whole], RATE);
    expect(record.settings.fromS).toBeGreaterThan(4);
    expect(numberOf(record.channels[0], 'thdDb')).toBeCloseTo(-60, 2);
  });

  it('is the whole file when the tone fills it', async () => {
    const { settings } = await analyseSamples(tone, [noisyTone(5)], RATE);
    expect([settings.fromS, settings.toS]).toEqual([0, 5]);
  });

  it('is what was asked for, or refused', async () => {
    const asked = await analyseSamples(tone, [noisyTone(5)], RATE, { fromS: 1.5, toS: 4 });
    expect(asked.settings).toMatchObject({ fromS: 1.5, toS: 4 });
    for (const settings of [
      { fromS: 4, toS: 2 },
      { toS: 9 },
      { fromS: -1 },
      { bandLowHz: 300, bandHighHz: 200 },
      { highestHarmonic: 1 },
    ]) {
      await expect(analyseSamples(tone, [noisyTone(5)], RATE, settings)).rejects.toMatchObject({
        code: 'BAD_ARGUMENT',
      });
    }
    await expect(analyseSamples(tone, [noisyTone(1)], RATE, { channel: 'right' })).rejects.toMatchObject({
      code: 'BAD_ARGUMENT',
    });
  });
});

describe('channels', () => {
  it('are named, measured one by one, and null where silent: one to eight', async () => {
    const one = noisyTone(1);
    for (const count of [1, 2, 8]) {
      const channels = Array.from({ length: count }, (_, index) =>
        index === 3 ? new Float64Array(RATE) : one.map((x) => x / (index + 1)),
      );
      const record = await analyseSamples(tone, channels, RATE);
      expect(record.channels.map(({ channel }) => channel)).toEqual(
        ['left', 'right', 'ch3', 'ch4', 'ch5', 'ch6', 'ch7', 'ch8'].slice(0, count),
      );
      record.channels.forEach((channel, index) => {
        if (index === 3) expect(channel.figures['thdDb']).toBeNull();
        else
          expect(numberOf(channel, 'fundamentalLevelDbfs')).toBeCloseTo(
            20 * Math.log10(0.5 / (index + 1)),
            3,
          );
      });
      if (count === 8)
        expect(record.warnings.find(({ code }) => code === 'channel-silent')?.channel).toBe('ch4');
    }
  });
});

describe('what a figure is worth', () => {
  const calibration: Calibration = {
    schema: 'benchlark-calibration/1',
    date: '2026-02-03',
    channels: [{ channel: 'left', fullScaleVrms: 4, expandedPercent: 0.2 }],
  };

  it('gives volts beside levels', async () => {
    const record = await analyseSamples(tone, [noisyTone(2), noisyTone(2)], RATE, { calibration });
    const [left, right] = record.channels;
    // Closed form: half of full scale is 2 V RMS = 6.0206 dBV (C-1.6).
    expect(numberOf(left, 'fundamentalLevelV')).toBeCloseTo(2, 4);
    expect(numberOf(left, 'fundamentalLevelDbv')).toBeCloseTo(6.0206, 3);
    // Sample peak: half of full scale's peak, 4 V · sqrt 2.
    expect(numberOf(left, 'samplePeakV')).toBeCloseTo(2 * Math.SQRT2, 2);
    // GUM: 0.2 % at k = 2 is 0.1 % standard; the estimate's part is far smaller.
    expect(left.uncertainty['fundamentalLevelV'].standard / 2).toBeCloseTo(0.001, 5);
    expect(right.figures['fundamentalLevelV']).toBeUndefined();
    expect(warningCodes(record)).toContain('calibration-incomplete');
  });

  it('gives no volts by a calibration of another rate, and says so', async () => {
    const other = { ...calibration, sampleRateHz: RATE * 2 };
    const record = await analyseSamples(tone, [noisyTone(2)], RATE, { calibration: other });
    expect(record.channels[0].figures['fundamentalLevelV']).toBeUndefined();
    expect(record.warnings.find(({ code }) => code === 'calibration-not-applicable')?.message).toContain(
      String(RATE * 2),
    );
    expect(warningCodes(record)).not.toContain('calibration-incomplete');
    expect(record.settings.calibration).toEqual(other);
    const same = { ...calibration, sampleRateHz: RATE };
    const held = await analyseSamples(tone, [noisyTone(2)], RATE, { calibration: same });
    expect(numberOf(held.channels[0], 'fundamentalLevelV')).toBeCloseTo(2, 4);
  });

  const baselineOf = (noise: number, harmonic: number): Promise<BenchRecord> =>
    analyseSamples(
      tone,
      [
        mix(
          sine(RATE * 4, RATE, 997, 0.5),
          sine(RATE * 4, RATE, 1994, 0.5 * harmonic),
          whiteNoise(RATE * 4, noise, 3),
        ),
      ],
      RATE,
    );

  it('corrects noise for the rig’s and bounds products', async () => {
    // Closed form: noise of equal parts reads 3.01 dB over either; a rig's harmonic 6.02 dB lower may add or take 6.02 dB.
    const baseline = await baselineOf(1e-4, 1e-3);
    const record = await analyseSamples(
      tone,
      [mix(sine(RATE * 4, RATE, 997, 0.5), sine(RATE * 4, RATE, 1994, 1e-3), whiteNoise(RATE * 4, 2e-4, 4))],
      RATE,
      { baseline },
    );
    const { limits, figures } = record.channels[0];
    expect(limits['noiseDbfs'].by).toBe('rig');
    expect(Math.abs(limits['noiseDbfs'].marginDb! - 6.02)).toBeLessThan(0.1);
    const corrected = 10 * Math.log10(3e-8 * 2 * (19980 / 24000));
    expect(Math.abs(limits['noiseDbfs'].low! - corrected)).toBeLessThan(0.15);
    expect(Math.abs(limits['thdDb'].marginDb! - 6.02)).toBeLessThan(0.2);
    expect(limits['thdDb'].low! - numberOf(record.channels[0], 'thdDb')).toBeCloseTo(-6.02, 0);
    expect(limits['thdDb'].high! - numberOf(record.channels[0], 'thdDb')).toBeCloseTo(3.52, 0);
    // SINAD rises as the unit gets better: its own lies above the reading.
    expect(limits['sinadDb'].low).toBeGreaterThanOrEqual(numberOf(record.channels[0], 'sinadDb') - 4);
    expect(warningCodes(record)).toContain('rig-influenced');
    expect(record.settings.baseline?.channels[0].traces).toEqual({});
    expect(figures['thdDb']).not.toBeNull();
  });

  it('calls a figure at the rig’s floor rig-limited', async () => {
    const baseline = await baselineOf(1e-4, 1e-3);
    const record = await analyseSamples(
      tone,
      [mix(sine(RATE * 4, RATE, 997, 0.5), whiteNoise(RATE * 4, 1e-4, 11))],
      RATE,
      { baseline },
    );
    expect(record.warnings.find(({ code }) => code === 'rig-limited')?.figures).toContain('noiseDbfs');
  });

  it('doesn’t apply a baseline of another rate, level or measure, and says so', async () => {
    const baseline = await baselineOf(1e-4, 1e-3);
    const rate = await analyseSamples(tone, [sine(96000 * 2, 96000, 997, 0.5)], 96000, { baseline });
    expect(rate.warnings.find(({ code }) => code === 'baseline-not-applicable')?.message).toMatch(/48000 Hz/);
    const level = await analyseSamples(tone, [noisyTone(2, 0.1)], RATE, { baseline });
    expect(warningCodes(level)).toContain('baseline-not-applicable');
    const idle = await analyseSamples(getMeasure('idle'), [whiteNoise(RATE * 2, 1e-5, 1)], RATE, {
      baseline,
    });
    expect(warningCodes(idle)).toContain('baseline-not-applicable');
  });

  it('doesn’t apply a baseline of another range, and says so', async () => {
    const baseline = embedBaseline(await baselineOf(1e-4, 1e-3), 'low gain');
    const against = (inputRange: string) =>
      analyseSamples(tone, [noisyTone(2)], RATE, { baseline, calibration: { ...calibration, inputRange } });
    const other = await against('high gain');
    expect(other.warnings.find(({ code }) => code === 'baseline-not-applicable')?.message).toMatch(
      /“low gain”.*“high gain”/,
    );
    expect(warningCodes(await against('low gain'))).not.toContain('baseline-not-applicable');
    expect(other.settings.baseline?.settings.inputRange).toBe('low gain');
  });
});

describe('records', () => {
  it('can be verified from themselves: settings, descriptor and all', async () => {
    const samples = [placed(noisyTone(3), RATE, RATE / 2), placed(noisyTone(3, 0.3), RATE, RATE / 2)];
    const baseline = await analyseSamples(tone, [noisyTone(2)], RATE);
    for (const measure of ['tone', 'idle', 'dynamic-range'].map(getMeasure)) {
      for (const options of [{}, { channel: 'right' as const, baseline, bandHighHz: 15000 }]) {
        const record = await analyseSamples(measure, samples, RATE, options);
        const stored = parseRecord(JSON.parse(JSON.stringify(toRecordJson(record, { traces: 'full' }))));
        const { descriptor, ...settings } = stored.settings;
        const again = await analyseSamples(measure, samples, RATE, { ...settings, descriptor });
        expect(compareRecords(stored, again)).toEqual([]);
      }
    }
  });

  it('hold the warnings of the file first', async () => {
    const fileWarnings = [{ code: 'last-frame-cut', channel: null, figures: [], message: 'x' }] as const;
    const record = await analyseSamples(tone, [noisyTone(1).map((x) => x + 0.01)], RATE, { fileWarnings });
    expect(warningCodes(record)).toEqual(['last-frame-cut', 'dc-offset']);
  });
});

describe('a change of the recording', () => {
  const samples = noisyTone(2);
  const read = async (channels: Float64Array[]): Promise<BenchRecord['channels']> =>
    (await analyseSamples(tone, channels, RATE)).channels;
  const ratios = ['thdDb', 'thdPlusNoiseDb', 'sinadDb', 'snrDb', 'enobBits', 'fundamentalFrequencyHz'];

  it('in gain, polarity or order of channels changes only what it should', async () => {
    const [reference] = await read([samples]);
    await fc.assert(
      fc.asyncProperty(
        fc.double({ min: -40, max: 5, noNaN: true }),
        fc.boolean(),
        async (gainDb, isInverted) => {
          const factor = 10 ** (gainDb / 20) * (isInverted ? -1 : 1);
          const [left, right] = await read([samples, samples.map((x) => x * factor)]);
          expect(left.figures).toEqual(reference.figures);
          for (const key of ratios) expect(numberOf(right, key)).toBeCloseTo(numberOf(reference, key), 6);
          for (const key of ['fundamentalLevelDbfs', 'noiseDbfs', 'samplePeakDbfs']) {
            expect(numberOf(right, key) - numberOf(reference, key)).toBeCloseTo(gainDb, 6);
          }
          const turned =
            (((right.harmonics[0].phaseDeg! - reference.harmonics[0].phaseDeg!) % 360) + 360) % 360;
          expect(Math.min(turned, 360 - turned)).toBeCloseTo(isInverted ? 180 : 0, 4);
          const [swapped, other] = await read([samples.map((x) => x * factor), samples]);
          expect(swapped.figures).toEqual(right.figures);
          expect(other.figures).toEqual(left.figures);
        },
      ),
      { numRuns: 6 },
    );
  });

  it('in delay changes neither levels nor the residual’s shape', async () => {
    const long = noisyTone(4);
    const one = (await read([long.slice(0, RATE * 3)]))[0];
    const other = (await read([long.slice(12345, 12345 + RATE * 3)]))[0];
    expect(numberOf(other, 'fundamentalLevelDbfs')).toBeCloseTo(numberOf(one, 'fundamentalLevelDbfs'), 4);
    expect(numberOf(other, 'thdDb')).toBeCloseTo(numberOf(one, 'thdDb'), 2);
    const [y, z] = [one.traces['residual'].y, other.traces['residual'].y];
    expect(Math.max(...Array.from(y, (value, index) => Math.abs(value - z[index])))).toBeLessThan(2e-6);
  });
});

describe('whatever comes in', () => {
  const anySamples = fc.oneof(
    fc.array(fc.double({ min: -2, max: 2, noNaN: true }), { maxLength: 3000 }),
    fc
      .tuple(fc.integer({ min: 0, max: 20000 }), fc.constantFrom(0, 1, -1, 1e-300, 1e-12, 0.5, 1e6))
      .map(([length, value]) => new Array<number>(length).fill(value)),
    fc
      .tuple(fc.integer({ min: 512, max: 9000 }), fc.integer({ min: 1, max: 300 }))
      .map(([length, period]) => Array.from({ length }, (_, n) => (n % period === 0 ? 1 : 0))),
  );

  it('gives a record of finite numbers or a typed error', async () => {
    await fc.assert(
      fc.asyncProperty(
        anySamples,
        fc.constantFrom(...measures),
        fc.constantFrom(1, 2, 8000, 48000, 1536000),
        async (values, measure, rate) => {
          try {
            const record = await analyseSamples(measure, [Float64Array.from(values)], rate);
            toRecordJson(record, { traces: 'full' }); // throws at the first number that isn't finite
            parseRecord(JSON.parse(JSON.stringify(toRecordJson(record, { traces: 'reduced' }))));
          } catch (error) {
            if (!(error instanceof DspInputError)) throw error;
            expect([
              'EMPTY_SIGNAL',
              'SEGMENT_TOO_SHORT',
              'NOTHING_MEASURABLE',
              'NOT_RECOGNISED',
              'BAD_ARGUMENT',
            ]).toContain(error.code);
          }
        },
      ),
      { numRuns: 150 },
    );
  });

  it('has no tone: noise, silence and clicks are nothing measurable', async () => {
    for (const samples of [whiteNoise(RATE * 3, 0.1, 1), new Float64Array(RATE)]) {
      await expect(analyseSamples(tone, [samples], RATE)).rejects.toMatchObject({
        code: 'NOTHING_MEASURABLE',
      });
    }
  });

  it('can be cancelled, and tells its progress', async () => {
    const shares: number[] = [];
    const signal = { aborted: false };
    const onProgress = (share: number): void => {
      shares.push(share);
      if (share > 0.5) signal.aborted = true;
    };
    await expect(analyseSamples(tone, [noisyTone(20)], RATE, { onProgress, signal })).rejects.toMatchObject({
      code: 'CANCELLED',
    });
    await analyseSamples(tone, [noisyTone(3)], RATE, { onProgress: (share) => shares.push(share) });
    expect(shares[shares.length - 1]).toBe(1);
  });
});

describe('recognition by signal', () => {
  it.each([
    { name: 'a tone', samples: noisyTone(3), measure: 'tone' },
    {
      name: 'a quiet tone',
      samples: mix(sine(RATE * 4, RATE, 997, 1e-3), whiteNoise(RATE * 4, 2e-5, 1)),
      measure: 'dynamic-range',
    },
    { name: 'noise of an idle input', samples: whiteNoise(RATE * 3, 1e-5, 1), measure: 'idle' },
    {
      name: 'hum of an idle input',
      samples: mix(sine(RATE * 3, RATE, 50, 1e-3), whiteNoise(RATE * 3, 1e-5, 1)),
      measure: 'idle',
    },
    { name: 'digital silence', samples: new Float64Array(RATE), measure: 'idle' },
    {
      name: 'a clipped tone',
      samples: sine(RATE * 3, RATE, 997, 1).map((x) => Math.max(-0.7, Math.min(0.4, x))),
      measure: 'tone',
    },
    { name: 'noise', samples: whiteNoise(RATE * 3, 0.1, 1), measure: 'filter' },
    {
      name: 'two tones',
      samples: synthesise(RATE * 3, RATE, [
        { frequencyHz: 60, amplitude: 0.6 },
        { frequencyHz: 7000, amplitude: 0.15 },
      ]),
      measure: 'two-tone',
    },
  ])('takes $name for $measure', async ({ samples, measure }) => {
    expect(await recognise(openMemorySource([samples], RATE))).toMatchObject({ measure, stimulusName: null });
  });
});
