import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { resampleByFft } from '../testing/resample.js';
import { intersampleMeasure } from './intersample-measure.js';

const RATE_HZ = 96_000;

/** A player at 48 kHz heard by a recorder at 96 kHz, through what stands behind the player's filter. */
async function play(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const { source, describe: describeFile } = createStimulus('intersample-tone', {
    sampleRateHz: 48_000,
    bitsPerSample: 24,
    ...options,
  });
  const [left] = await source.read(0, source.frameCount);
  const heard = resampleByFft(left, 48_000, RATE_HZ);
  return { channels: pass([heard, heard.slice()], RATE_HZ, stages), descriptor: describeFile('') };
}

const measure = (channels: readonly Float64Array[], options = {}) =>
  analyseSamples(intersampleMeasure, channels, RATE_HZ, options);

describe('peaks between samples', () => {
  it('pass a stage with room unharmed', async () => {
    const { channels } = await play([
      { kind: 'gain', channel: 'both', gainDb: -4 },
      { kind: 'noise', channel: 'both', levelDbfs: -110 },
      { kind: 'clock', channel: 'both', ppm: 90 },
    ]);
    const record = await measure(channels);
    const [left] = record.channels;
    expect(Math.abs(numberOf(left, 'levelErrorDb'))).toBeLessThan(0.001);
    // Closed form: samples at ±1 of a wave at a quarter of the rate and 45° mean a peak of √2, +3.0103 dB.
    expect(numberOf(left, 'highToneLevelDbfs')).toBeCloseTo(3.0103 - 4, 2);
    expect(numberOf(left, 'lowToneLevelDbfs')).toBeCloseTo(3.0103 - 10, 2);
    expect(left.figures['thdDb']).toBeNull();
    expect(left.limits['thdDb'].below).toBeLessThan(-90);
    expect(record.stimulus).toMatchObject({ name: 'intersample-tone', recognisedBy: 'marks' });
  });

  // Closed form of a clip of both halves at c of the peak: b1 = (2/π)(t + c cos t), t = arcsin c.
  it.each([0.99, 0.9, 0.8])('lose level where a stage clips at %d of their peak', async (share) => {
    const c = share * Math.SQRT2;
    const { channels } = await play([{ kind: 'clip', channel: 'both', positive: c, negative: c }]);
    const [left] = (await measure(channels)).channels;
    const t = Math.asin(share);
    const lossDb = 20 * Math.log10((2 / Math.PI) * (t + share * Math.cos(t)));
    // What the clip makes above half the recorder's rate folds back: 12 kHz × 7 falls on the tone itself at 96 kHz.
    expect(Math.abs(numberOf(left, 'levelErrorDb') - lossDb)).toBeLessThan(share === 0.99 ? 0.06 : 0.25);
    expect(numberOf(left, 'levelErrorDb')).toBeLessThan(-0.005);
    expect(numberOf(left, 'thdDb')).toBeLessThan(-15);
  });

  it('a converter without room at 48 kHz shows it as a level error and a third harmonic', async () => {
    const { channels } = await play([{ kind: 'clip', channel: 'left', positive: 1.2, negative: 1.2 }]);
    const [left, right] = (await measure(channels)).channels;
    expect(numberOf(left, 'levelErrorDb')).toBeLessThan(-0.3);
    expect(numberOf(left, 'thdDb')).toBeGreaterThan(-40);
    expect(Math.abs(numberOf(right, 'levelErrorDb'))).toBeLessThan(0.001);
  });

  it('have no harmonic to show when the recorder is no faster than the player', async () => {
    const { source } = createStimulus('intersample-tone', { sampleRateHz: 48_000, bitsPerSample: 24 });
    const channels = await source.read(0, source.frameCount);
    const record = await analyseSamples(intersampleMeasure, channels, 48_000);
    expect(record.channels[0].figures['thdDb']).toBeNull();
    expect(warningCodes(record)).toContain('no-harmonics-in-band');
    expect(Math.abs(numberOf(record.channels[0], 'levelErrorDb'))).toBeLessThan(0.001);
  });

  it('are found by their descriptor without marks', async () => {
    const { channels, descriptor } = await play(
      [
        { kind: 'lead', channel: 'both', seconds: 0.7 },
        { kind: 'noise', channel: 'both', levelDbfs: -100 },
      ],
      { isBare: true },
    );
    const record = await measure(channels, { descriptor });
    expect(Math.abs(numberOf(record.channels[0], 'levelErrorDb'))).toBeLessThan(0.01);
  });

  it('are refused where there are none', async () => {
    await expect(measure([new Float64Array(RATE_HZ)])).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
  });
});
