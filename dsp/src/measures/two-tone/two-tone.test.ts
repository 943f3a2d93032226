import { describe, expect, it } from 'vitest';
import closedForm from '../../../../test-vectors/two-tone/closed-form.json' with { type: 'json' };
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import { createRandom } from '../../random/create-random.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { bend, mix, synthesise, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { twoToneStepsMeasure } from '../two-tone-steps/two-tone-steps-measure.js';
import { twoToneMeasure } from './two-tone-measure.js';

const RATE_HZ = 96_000;

const pairOf = (
  low: number,
  high: number,
  a1: number,
  a2: number,
  seconds = 3,
  rate = RATE_HZ,
): Float64Array =>
  synthesise(seconds * rate, rate, [
    { frequencyHz: low, amplitude: a1, phaseRad: 0.3 },
    { frequencyHz: high, amplitude: a2, phaseRad: 1.1 },
  ]);

const read = async (samples: Float64Array, rate = RATE_HZ) =>
  (await analyseSamples(twoToneMeasure, [samples], rate)).channels[0];

async function play(
  name: string,
  stages: readonly PracticeStage[],
  options: Partial<StimulusOptions> = {},
  rate = 48_000,
) {
  const { source, describe: describeFile } = createStimulus(name, {
    sampleRateHz: rate,
    bitsPerSample: 24,
    ...options,
  });
  const channels = pass(await source.read(0, source.frameCount), rate, stages);
  return { channels, descriptor: describeFile('') };
}

describe('two tones through a known bend', () => {
  // Every published row (source in the file); 0.001 dB is the tolerance without noise.
  it.each(closedForm.cases.map((row, index) => ({ ...row, index })))('row $index: $case', async (row) => {
    const { A1, A2, a2, a3 } = row;
    const isModulation = 'dm2' in row;
    const [low, high] = isModulation ? [60.3, 7000.9] : [19_000.3, 20_000.7];
    const left = await read(bend(pairOf(low, high, A1, A2, 4), [1, a2, a3]));
    const expectRatio = (key: string, ratio: number) => {
      if (ratio === 0) expect(left.figures[key]).toBeNull();
      else expect(numberOf(left, key)).toBeCloseTo(20 * Math.log10(ratio), 3);
    };
    if (isModulation) {
      expectRatio('modulationDistortionDb', row.modulationTotal_RSS_of_pairs ?? 0);
      expect(numberOf(left, 'modulationDistortionPercent')).toBeCloseTo(
        100 * (row.modulationTotal_RSS_of_pairs ?? 0),
        5,
      );
    } else {
      expectRatio('differenceD2Db', row.dd2 ?? 0);
      expectRatio('differenceD3Db', row.dd3 ?? 0);
      expect(numberOf(left, 'differenceDistortionDb')).toBeCloseTo(
        20 * Math.log10(Math.hypot(row.dd2 ?? 0, row.dd3 ?? 0)),
        3,
      );
    }
    expect(numberOf(left, 'lowToneFrequencyHz')).toBeCloseTo(low, 6);
    expect(numberOf(left, 'highToneFrequencyHz')).toBeCloseTo(high, 6);
  });

  it('at random tones, levels and rates', async () => {
    const random = createRandom(77);
    for (let draw = 0; draw < 12; draw++) {
      const rate = [44_100, 48_000, 96_000][draw % 3];
      const high = 4000 + 9000 * random();
      const low = 50 + 300 * random();
      const a2 = 10 ** (-3 - random());
      const left = await read(bend(pairOf(low, high, 0.4, 0.1, 4, rate), [1, a2, 0]), rate);
      // d_m2 = 2 a2 A1 (closed form of the square's cross term).
      expect(numberOf(left, 'modulationDistortionDb')).toBeCloseTo(20 * Math.log10(2 * a2 * 0.4), 3);
    }
  });

  it('keeps to 0.05 dB in noise that lies 40 dB under the products in their bins', async () => {
    const clean = bend(pairOf(19_000, 20_000, 0.5, 0.5, 5), [1, 1e-3, 0]);
    // D2 of -72 dB is a line of -72 dBFS; noise of -90 dBFS over 48 kHz lies at about -137 dBFS a bin of 0.37 Hz.
    const left = await read(mix(clean, whiteNoise(clean.length, Math.SQRT1_2 * 10 ** (-90 / 20), 5)));
    expect(Math.abs(numberOf(left, 'differenceD2Db') - 20 * Math.log10(2.5e-4))).toBeLessThan(0.05);
    expect(left.uncertainty['differenceD2Db'].expanded).toBeGreaterThan(0);
    expect(left.figures['differenceD3Db']).toBeNull();
    expect(left.limits['differenceD3Db'].below).toBeLessThan(-100);
  });

  it('names its products by their orders', async () => {
    const left = await read(bend(pairOf(60, 7000, 0.8, 0.2), [1, 1e-3, 1e-3]));
    const at = (lowOrder: number, highOrder: number) =>
      left.components.find((line) => line['lowOrder'] === lowOrder && line['highOrder'] === highOrder);
    expect(at(1, 1)?.['frequencyHz']).toBeCloseTo(7060, 3);
    expect(at(-2, 1)?.['frequencyHz']).toBeCloseTo(6880, 3);
    expect(Number(at(2, 0)?.['levelDbfs'])).toBeCloseTo(20 * Math.log10(0.5e-3 * 0.64), 2);
  });
});

describe('two tones as recorded', () => {
  it('are found by their marks, with the clock, at any polarity and gain', async () => {
    const { channels } = await play('modulation-pair', [
      { kind: 'polynomial', channel: 'both', coefficients: [1, 1e-3] },
      { kind: 'gain', channel: 'both', gainDb: -8 },
      { kind: 'polarity', channel: 'both' },
      { kind: 'clock', channel: 'both', ppm: 150 },
      { kind: 'lead', channel: 'both', seconds: 0.5 },
      { kind: 'noise', channel: 'both', levelDbfs: -110 },
    ]);
    const record = await analyseSamples(twoToneMeasure, channels, 48_000);
    expect(record.stimulus).toMatchObject({
      name: 'modulation-pair',
      recognisedBy: 'marks',
      polarity: 'inverted',
    });
    expect(record.stimulus?.clockOffsetPpm).toBeCloseTo(150, 0);
    const peak = 10 ** (-1 / 20);
    for (const channel of record.channels) {
      expect(numberOf(channel, 'highToneLevelDbfs')).toBeCloseTo(20 * Math.log10(0.2 * peak) - 8, 2);
      expect(numberOf(channel, 'modulationDistortionDb')).toBeCloseTo(20 * Math.log10(2e-3 * 0.8 * peak), 1);
    }
  });

  it('without two tones are nothing measurable', async () => {
    const tone = synthesise(96_000, 48_000, [{ frequencyHz: 997, amplitude: 0.5 }]);
    await expect(analyseSamples(twoToneMeasure, [tone], 48_000)).rejects.toMatchObject({
      code: 'NOTHING_MEASURABLE',
    });
  });
});

describe('two tones against level', () => {
  const measure = (channels: readonly Float64Array[], options = {}) =>
    analyseSamples(twoToneStepsMeasure, channels, 48_000, options);

  // Closed form: a square's products fall 20 dB, a cube's 40 dB, for 20 dB less of both tones.
  it('follow the square and the cube of the level', async () => {
    const { channels } = await play('difference-steps', [
      { kind: 'polynomial', channel: 'both', coefficients: [1, 2e-3, 2e-3] },
    ]);
    const [left] = (await measure(channels)).channels;
    const at = (trace: string, level: number): number =>
      left.traces[trace].y[Array.from(left.traces[trace].x).indexOf(level)];
    // The tones themselves come out as A + a3 (3/4 A³ + 3/2 A³).
    const tones = 2 * (0.5 + 2e-3 * 2.25 * 0.125);
    expect(at('differenceD2', 0)).toBeCloseTo(20 * Math.log10((2e-3 * 0.25) / tones), 2);
    expect(at('differenceD2', -20)).toBeCloseTo(20 * Math.log10(2e-3 * 0.025), 2);
    expect(at('differenceD3', -20) - at('differenceD3', 0)).toBeCloseTo(-40, 1);
  });

  it('show the knee of a clipped half: products above it and none below', async () => {
    const { channels } = await play('modulation-steps', [
      { kind: 'clip', channel: 'left', positive: 0.763, negative: 2 },
      { kind: 'noise', channel: 'both', levelDbfs: -110 },
    ]);
    const [left, right] = (await measure(channels)).channels;
    const { x, y } = left.traces['modulationDistortion'];
    const levels = Array.from(x);
    for (const level of [0, -1, -2]) expect(y[levels.indexOf(level)]).toBeGreaterThan(-60);
    for (const [index, level] of levels.entries()) if (level < -2.35) expect(y[index]).toBeLessThan(-75);
    expect(Array.from(right.traces['modulationDistortion'].y).every((value) => value < -75)).toBe(true);
  });

  it('found without marks by their descriptor', async () => {
    const { channels, descriptor } = await play(
      'modulation-steps',
      [
        { kind: 'polynomial', channel: 'both', coefficients: [1, 1e-3] },
        { kind: 'lead', channel: 'both', seconds: 0.9 },
        { kind: 'noise', channel: 'both', levelDbfs: -100 },
      ],
      { isBare: true },
    );
    const record = await measure(channels, { descriptor });
    const { x, y } = record.channels[0].traces['modulationDistortion'];
    expect(y[Array.from(x).indexOf(-3)]).toBeCloseTo(20 * Math.log10(1.6e-3 * 10 ** (-3 / 20)), 1);
    expect(warningCodes(record)).not.toContain('stimulus-assumed');
  });
});
