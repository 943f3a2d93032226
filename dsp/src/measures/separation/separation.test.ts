import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { BenchRecord } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { analyseSamples, warningCodes, type AnalyseOptions } from '../testing/analyse-samples.js';
import { separationMeasure } from './separation-measure.js';

const RATE_HZ = 48_000;
const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });

async function play(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const { source, describe: describeFile } = createStimulus('separation', {
    sampleRateHz: RATE_HZ,
    bitsPerSample: 24,
    ...options,
  });
  return {
    channels: pass(await source.read(0, source.frameCount), RATE_HZ, stages),
    descriptor: describeFile(''),
  };
}

const measure = (channels: readonly Float64Array[], options: AnalyseOptions = {}) =>
  analyseSamples(separationMeasure, channels, RATE_HZ, options);

function between(record: BenchRecord, key: string): number {
  const value = record.between.figures[key];
  if (typeof value !== 'number') throw new Error(`${key} is ${String(value)}`);
  return value;
}

/** Left and right mixed by hand: what a resistor between the channels does. */
const leak = ([left, right]: readonly Float64Array[], share: number): Float64Array[] => [
  left.map((x, n) => x + share * right[n]),
  right.map((x, n) => x + 2 * share * left[n]),
];

describe('separation', () => {
  // Closed form: 20 lg of the share that leaks; 0.1 dB is the tolerance with noise 40 dB under it.
  it.each([1e-2, 1e-3, 1e-5])('reads a leak of %d both ways', async (share) => {
    const { channels } = await play([]);
    const record = await measure(leak(channels, share));
    expect(between(record, 'separationRightToLeftAt1kHzDb')).toBeCloseTo(-20 * Math.log10(share), 1);
    expect(between(record, 'separationLeftToRightAt1kHzDb')).toBeCloseTo(-20 * Math.log10(2 * share), 1);
    expect(between(record, 'separationLeftToRightAt10kHzDb')).toBeCloseTo(-20 * Math.log10(2 * share), 1);
  });

  it('follows a leak that grows by 6 dB an octave', async () => {
    const { channels } = await play([
      { kind: 'crosstalk', channel: 'both', levelDb: -80, slopeDbPerOctave: 6 },
      noise(-120),
    ]);
    const record = await measure(channels);
    expect(between(record, 'separationLeftToRightAt1kHzDb')).toBeCloseTo(80, 0);
    // A decade is 3.32 octaves: 20 dB (19.93).
    expect(Math.abs(between(record, 'separationRightToLeftAt10kHzDb') - 60)).toBeLessThan(0.5);
    const { x, y } = record.between.traces['leftToRight'];
    expect(x[x.length - 1]).toBeGreaterThan(20_000);
    expect(y[x.length - 1]).toBeLessThan(56);
  });

  it('is only bounded where the noise hides it', async () => {
    const { channels } = await play([noise(-90)]);
    const record = await measure(leak(channels, 1e-8));
    expect(record.between.figures['separationLeftToRightAt1kHzDb']).toBeNull();
    expect(record.warnings.find(({ code }) => code === 'separation-in-noise')?.message).toMatch(
      /at least \d+/,
    );
  });

  it('of joined channels is nothing', async () => {
    const { channels } = await play([]);
    const sum = channels[0].map((x, n) => 0.5 * (x + channels[1][n]));
    const record = await measure([sum, sum.slice()]);
    expect(Math.abs(between(record, 'separationLeftToRightAt1kHzDb'))).toBeLessThan(0.01);
  });

  it('of swapped channels is negative, and says so', async () => {
    const { channels } = await play([noise(-100)]);
    const record = await measure([...leak(channels, 1e-3)].reverse());
    expect(between(record, 'separationLeftToRightAt1kHzDb')).toBeLessThan(-40);
    expect(warningCodes(record)).toContain('channels-swapped');
    // What each channel recorded is compared all the same: the sweep came through both alike.
    expect(Math.abs(between(record, 'balanceDb'))).toBeLessThan(0.01);
    expect(Math.abs(between(record, 'interchannelDelayS') * RATE_HZ)).toBeLessThan(0.01);
    expect(record.between.figures['interchannelPolarity']).toBe('same');
    expect(record.stimulus?.polarity).toBe('same');
  });
});

describe('balance, delay and polarity between the channels', () => {
  // Closed form: R = 0.99 L is -0.0873 dB; 0.001 dB and a hundredth of a sample are the tolerances.
  it.each([
    { gainDb: 20 * Math.log10(0.99), samples: 0.16, ppm: 0 },
    { gainDb: 1.5, samples: 2.37, ppm: 90 },
    { gainDb: -3, samples: 0, ppm: -150 },
  ])('reads $gainDb dB, $samples samples at $ppm ppm', async ({ gainDb, samples, ppm }) => {
    const { channels } = await play([
      { kind: 'gain', channel: 'right', gainDb },
      { kind: 'clock', channel: 'both', ppm },
      { kind: 'delay', channel: 'right', samples },
      { kind: 'lead', channel: 'both', seconds: 0.4 },
    ]);
    const record = await measure(channels);
    expect(Math.abs(between(record, 'balanceDb') - gainDb)).toBeLessThan(0.001);
    // Two turns, each placed by the clock that the marks gave: 0.1 ppm over ten seconds are 0.05 samples.
    const tolerance = ppm === 0 ? 0.01 : 0.06;
    expect(Math.abs(between(record, 'interchannelDelayS') * RATE_HZ - samples)).toBeLessThan(tolerance);
    expect(record.between.figures['interchannelPolarity']).toBe('same');
  });

  it('tells a channel that is inverted', async () => {
    const { channels } = await play([{ kind: 'polarity', channel: 'right' }, noise(-100)]);
    const record = await measure(channels);
    expect(record.between.figures['interchannelPolarity']).toBe('inverted');
    expect(record.stimulus?.polarity).toBe('same');
  });
});

describe('what can be placed', () => {
  it('a bare file by its descriptor', async () => {
    const { channels, descriptor } = await play(
      [{ kind: 'lead', channel: 'both', seconds: 1.1 }, noise(-110)],
      { isBare: true },
    );
    const record = await measure(leak(channels, 1e-3), { descriptor });
    expect(between(record, 'separationRightToLeftAt1kHzDb')).toBeCloseTo(60, 1);
    expect(record.stimulus?.delayS).toBeCloseTo(1.1, 4);
  });

  it('not mono, nor a recording without marks or descriptor', async () => {
    const { channels } = await play([noise(-100)], { isBare: true });
    await expect(measure([channels[0]])).rejects.toMatchObject({ code: 'NOTHING_MEASURABLE' });
    await expect(measure(channels)).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
  });
});
