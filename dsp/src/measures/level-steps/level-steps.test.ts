import { describe, expect, it } from 'vitest';
import { applyDevice } from '../../practice/apply-device.js';
import type { PracticeStage } from '../../practice/device.js';
import { PRACTICE_DEVICES } from '../../practice/practice-devices.js';
import { pass } from '../../practice/testing/pass.js';
import { createRandom } from '../../random/create-random.js';
import type { BenchRecord, ChannelResult } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { quantise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes, type AnalyseOptions } from '../testing/analyse-samples.js';
import { levelStepsMeasure } from './level-steps-measure.js';

const RATE_HZ = 48_000;
const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });
const gain = (gainDb: number): PracticeStage => ({ kind: 'gain', channel: 'both', gainDb });

async function play(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const { source, describe: describeFile } = createStimulus('level-steps', {
    sampleRateHz: RATE_HZ,
    bitsPerSample: 24,
    ...options,
  });
  const rate = options.sampleRateHz ?? RATE_HZ;
  const channels = pass(await source.read(0, source.frameCount), rate, stages);
  return { channels, descriptor: describeFile('') };
}

const measure = (channels: readonly Float64Array[], options: AnalyseOptions = {}, rate = RATE_HZ) =>
  analyseSamples(levelStepsMeasure, channels, rate, options);

async function measured(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const { channels } = await play(stages, options);
  return measure(channels, {}, options.sampleRateHz);
}

function at(channel: ChannelResult, trace: string, levelDbfs: number): number {
  const { x, y } = channel.traces[trace];
  const index = Array.from(x).indexOf(levelDbfs);
  if (index < 0) throw new Error(`${trace} has no point at ${levelDbfs}`);
  return y[index];
}

/** Deviation that a hard clip of one half at c makes, dB: the fundamental of a one-sided clip (Fourier series). */
function clippedDb(levelDbfs: number, c: number): number {
  const ratio = c / 10 ** (levelDbfs / 20);
  if (ratio >= 1) return 0;
  const p = Math.acos(ratio);
  return 20 * Math.log10(1 - (p - ratio * Math.sin(p)) / Math.PI);
}

describe('a unit without a fault', () => {
  it('follows to 0.001 dB, at any gain, polarity and clock', async () => {
    const stages: PracticeStage[] = [
      gain(-7.3),
      { kind: 'polarity', channel: 'both' },
      { kind: 'clock', channel: 'both', ppm: -170 },
      { kind: 'lead', channel: 'both', seconds: 0.4 },
    ];
    const record = await measured(stages);
    const [left, right] = record.channels;
    for (const channel of [left, right]) {
      // A full-scale tone of 24 bits keeps two steps off the end of the scale, 2e-6 dB; 0.001 dB is the closed form's.
      expect(Math.abs(numberOf(channel, 'maxDeviationDb'))).toBeLessThan(0.001);
      expect(Math.abs(numberOf(channel, 'fullScaleGainErrorDb'))).toBeLessThan(0.001);
      expect(numberOf(channel, 'linearDownToDbfs')).toBe(-120);
      expect(at(channel, 'measuredLevel', -35)).toBeCloseTo(-42.3, 3);
    }
    expect(record.stimulus).toMatchObject({
      name: 'level-steps',
      recognisedBy: 'marks',
      polarity: 'inverted',
    });
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) + 170)).toBeLessThan(0.5);
    expect(record.reference.unitFullScaleDbfs).toBeCloseTo(-7.3, 3);
  });

  // Common practice, no source: an inexpensive converter follows to about -90 dBFS and is lost in its noise by about -105.
  it('follows down to -90 dBFS and is lost in its noise by -105', async () => {
    const { channels } = await play([]);
    const recorded = applyDevice(channels, RATE_HZ, {
      ...PRACTICE_DEVICES['plain-converter'],
      sampleRateHz: RATE_HZ,
    });
    const [left] = (await measure(recorded)).channels;
    expect(numberOf(left, 'linearDownToDbfs')).toBeLessThanOrEqual(-90);
    expect(at(left, 'thdPlusNoise', -90)).toBeLessThan(-4);
    // More noise than tone: THD+N against the total nears 0 dB.
    expect(at(left, 'thdPlusNoise', -105)).toBeGreaterThan(-1);
  });

  it('states deviation and noise within the uncertainty it claims', async () => {
    const [left] = (await measured([noise(-80)])).channels;
    const { expanded } = left.uncertainty['maxDeviationDb'];
    expect(Math.abs(numberOf(left, 'maxDeviationDb'))).toBeLessThan(2.5 * expanded);
    // -80 dBFS over 24 kHz is 0.796 dB less in 19,980 Hz (powers in proportion to the band); half a second knows it to 0.1 dB.
    expect(Math.abs(at(left, 'noise', -20) + 80.796)).toBeLessThan(0.3);
    expect(Math.abs(at(left, 'residual', -1) - at(left, 'residual', -60))).toBeLessThan(1);
  });
});

describe('an ideal 16-bit path', () => {
  // Closed form: triangular dither makes -93.747 dBFS in 20 Hz to 20 kHz at 44.1 kHz, so THD+N = -(93.747 + L).
  it.each([-20, -40, -60])('has the THD+N of its dither at %d dBFS', async (levelDbfs) => {
    const { channels } = await play([], { sampleRateHz: 44_100 });
    const coded = quantise(channels[0], 16, createRandom(9));
    const [left] = (await measure([coded], { bits: 16 }, 44_100)).channels;
    // Half a second of noise is known to about 0.1 dB a step.
    expect(Math.abs(at(left, 'thdPlusNoise', levelDbfs) + 93.747 + levelDbfs)).toBeLessThan(0.4);
    expect(Math.abs(at(left, 'deviation', levelDbfs))).toBeLessThan(0.01);
  });

  // Closed form: the fundamental of a rounded sine of A steps, (4/π) Σ √(1 - ((k+1/2)/A)²), without dither.
  it('shows the steps of a quantiser without dither at the lowest levels', async () => {
    const step = 2 ** -15;
    const amplitude = 10 ** (-85 / 20) / step;
    let sum = 0;
    for (let k = 0; k <= Math.floor(amplitude - 0.5); k++) sum += Math.sqrt(1 - ((k + 0.5) / amplitude) ** 2);
    const expectedDb = 20 * Math.log10(((4 / Math.PI) * sum) / amplitude);
    const { channels } = await play([]);
    const coded = channels[0].map((x) => Math.floor(x / step + 0.5) * step);
    const [left] = (await measure([coded])).channels;
    expect(Math.abs(at(left, 'deviation', -85) - expectedDb)).toBeLessThan(0.03);
    // Half a step and less gives nothing: -96.3 dBFS.
    expect(Array.from(left.traces['measuredLevel'].x)).not.toContain(-100);
    expect(numberOf(left, 'linearDownToDbfs')).toBeGreaterThanOrEqual(-90);
  });
});

describe('a stage that holds one half back', () => {
  const stages: PracticeStage[] = [{ kind: 'clip', channel: 'left', positive: 0.763, negative: 2 }];

  it('deviates by the closed form above its knee and nowhere below', async () => {
    const record = await measured([...stages, gain(-3)]);
    const [left, right] = record.channels;
    // The trade's figures for 0.763 of full scale, and the Fourier series they follow from.
    for (const [levelDbfs, given] of [
      [0, -0.6],
      [-1, -0.283],
      [-2, -0.041],
    ] as const) {
      expect(Math.abs(clippedDb(levelDbfs, 0.763) - given)).toBeLessThan(0.001);
      expect(Math.abs(at(left, 'deviation', levelDbfs) - clippedDb(levelDbfs, 0.763))).toBeLessThan(0.002);
    }
    for (const levelDbfs of [-2.5, -3, -6, -40]) {
      expect(Math.abs(at(left, 'deviation', levelDbfs))).toBeLessThan(0.001);
    }
    expect(numberOf(left, 'fullScaleGainErrorDb')).toBeCloseTo(-0.6, 2);
    expect(numberOf(left, 'maxDeviationDb')).toBeCloseTo(-0.6, 2);
    expect(Math.abs(numberOf(right, 'maxDeviationDb'))).toBeLessThan(0.001);
  });

  it('adds harmonics above the knee and none below, and flattens one half alone', async () => {
    const [left] = (await measured([...stages, noise(-110)])).channels;
    const harmonic2 = Array.from(left.traces['harmonic2'].x);
    expect(harmonic2).toEqual(expect.arrayContaining([0, -1, -2]));
    expect(
      harmonic2.filter((level) => level < -2.35 && level > -40 && at(left, 'harmonic2', level) > -95),
    ).toEqual([]);
    // Fourier series: the clip's mean of -(sin p - c p)/π is left out, so the crest reads c and the trough 1, both moved by it.
    const p = Math.acos(0.763);
    const mean = -(Math.sin(p) - 0.763 * p) / Math.PI;
    expect(at(left, 'positivePeak', 0)).toBeCloseTo(20 * Math.log10(0.763 - mean), 1);
    expect(at(left, 'negativePeak', 0)).toBeCloseTo(20 * Math.log10(1 + mean), 1);
    // The residual is flat below the knee, and jumps above.
    expect(Math.abs(at(left, 'residual', -3) - at(left, 'residual', -40))).toBeLessThan(1);
    expect(at(left, 'residual', -1) - at(left, 'residual', -3)).toBeGreaterThan(50);
  });

  // Closed form of a cubic: h1 = A + 3/4 a3 A³, against the same at -20 dBFS.
  it('a gentle bend deviates as its cubic says', async () => {
    const [left] = (await measured([{ kind: 'polynomial', channel: 'both', coefficients: [1, 0, -0.01] }]))
      .channels;
    const gainAt = (amplitude: number): number => 20 * Math.log10(1 - 0.0075 * amplitude ** 2);
    expect(Math.abs(gainAt(1) + 0.0654)).toBeLessThan(0.0001); // published for y = x - 0.01 x³ at peak 1
    for (const levelDbfs of [0, -1, -3, -6]) {
      const expected = gainAt(10 ** (levelDbfs / 20)) - gainAt(0.1);
      expect(Math.abs(at(left, 'deviation', levelDbfs) - expected)).toBeLessThan(0.001);
    }
    // H3 = a3 A³ / 4 over h1.
    const h3 = 20 * Math.log10(0.0025 / (1 - 0.0075));
    expect(at(left, 'harmonic3', 0)).toBeCloseTo(h3, 2);
  });
});

describe('recordings of other kinds', () => {
  it('a file at 44.1 kHz recorded at 96 kHz', async () => {
    const { source } = createStimulus('level-steps', { sampleRateHz: 96_000, bitsPerSample: 24 });
    const played = await source.read(0, source.frameCount);
    const record = await measure(pass(played, 96_000, [gain(-1)]), {}, 96_000);
    expect(at(record.channels[0], 'measuredLevel', -10)).toBeCloseTo(-11, 3);
  });

  it('without marks, with its descriptor: found by its shape', async () => {
    const { channels, descriptor } = await play(
      [gain(-5), { kind: 'lead', channel: 'both', seconds: 1.37 }, noise(-90)],
      { isBare: true, frequencyHz: 1000 },
    );
    const record = await measure(channels, { descriptor });
    expect(at(record.channels[0], 'measuredLevel', -20)).toBeCloseTo(-25, 2);
    expect(Math.abs(at(record.channels[0], 'deviation', 0))).toBeLessThan(0.01);
    expect(record.reference.unitFullScaleDbfs).toBeCloseTo(-5, 2);
  });

  it('with neither: measured as the usual ladder, and says so', async () => {
    const { channels } = await play([gain(-5), { kind: 'lead', channel: 'both', seconds: 0.8 }, noise(-90)], {
      isBare: true,
    });
    const record = await measure(channels);
    expect(warningCodes(record)).toContain('stimulus-assumed');
    expect(record.reference.unitFullScaleDbfs).toBeNull();
    expect(Math.abs(numberOf(record.channels[0], 'maxDeviationDb'))).toBeLessThan(0.01);
  });

  it('that ended early: the steps that are missing are named, the others stand', async () => {
    const { channels, descriptor } = await play([noise(-100)]);
    const step = descriptor.parts[0].steps.find(({ levelDbfs }) => levelDbfs === -50)!;
    const cut = channels.map((samples) => samples.slice(0, Math.round(step.fromS * RATE_HZ)));
    const record = await measure(cut);
    expect(record.warnings.find(({ code }) => code === 'steps-missing')?.message).toContain('-50, -55');
    expect(Array.from(record.channels[0].traces['deviation'].x)[0]).toBe(-45);
  });

  it('with one channel silent, or the tone in left alone', async () => {
    const { channels } = await play([noise(-100)], { channels: 'left' });
    const silent = await measure([channels[0], new Float64Array(channels[0].length)], {});
    expect(silent.channels[1].figures['maxDeviationDb']).toBeNull();
    expect(warningCodes(silent)).toContain('tone-missing');
    expect(Math.abs(numberOf(silent.channels[0], 'maxDeviationDb'))).toBeLessThan(0.01);
  });

  it('that the recorder clipped say so', async () => {
    const { channels } = await play([gain(2)]);
    const coded = channels.map((samples) =>
      quantise(
        samples.map((x) => Math.max(-1, Math.min(1, x))),
        24,
      ),
    );
    expect(warningCodes(await measure(coded, { bits: 24 }))).toContain('recording-overloaded');
  });

  it('are refused when they hold no ladder', async () => {
    const tone = Float64Array.from({ length: 20 * RATE_HZ }, (_, n) => 0.5 * Math.sin(0.13 * n));
    await expect(measure([tone])).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
    await expect(measure([new Float64Array(RATE_HZ)])).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
  });
});

it('gives the same record from its own settings', async () => {
  const { channels } = await play([noise(-90)]);
  const record: BenchRecord = await measure(channels);
  const settings = { ...record.settings, fromS: undefined, toS: undefined };
  expect(JSON.stringify(await measure(channels, settings))).toBe(JSON.stringify(record));
});
