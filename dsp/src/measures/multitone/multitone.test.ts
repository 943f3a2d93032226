import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { ChannelResult } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { analyseSamples, numberOf, warningCodes, type AnalyseOptions } from '../testing/analyse-samples.js';
import { resampleByFft } from '../testing/resample.js';
import { multitoneMeasure } from './multitone-measure.js';

const RATE_HZ = 48_000;
const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });

async function play(
  stages: readonly PracticeStage[],
  options: Partial<StimulusOptions> = {},
  rate = RATE_HZ,
) {
  const { source, describe: describeFile } = createStimulus('multitone', {
    sampleRateHz: rate,
    bitsPerSample: 24,
    ...options,
  });
  return {
    channels: pass(await source.read(0, source.frameCount), rate, stages),
    descriptor: describeFile(''),
  };
}

const measure = (channels: readonly Float64Array[], options: AnalyseOptions = {}, rate = RATE_HZ) =>
  analyseSamples(multitoneMeasure, channels, rate, options);

function greatestLevel({ traces }: ChannelResult, expected: (hz: number) => number): number {
  const { x, y } = traces['response'];
  return Math.max(...Array.from(x, (hz, k) => Math.abs(y[k] - expected(hz))));
}

describe('the response at every tone', () => {
  it.each([44_100, 48_000, 96_000, 192_000])(
    'of a straight wire is flat to 0.01 dB at %d Hz',
    async (rate) => {
      const { channels } = await play([{ kind: 'clock', channel: 'both', ppm: 130 }], {}, rate);
      const [left] = (await measure(channels, {}, rate)).channels;
      // The closed form's tolerance; every tone was played alike.
      expect(greatestLevel(left, () => 0)).toBeLessThan(0.01);
      expect(left.traces['response'].x[0]).toBeCloseTo(19.953 * (1 + 130e-6), 2);
      expect(left.traces['response'].x.length).toBeGreaterThanOrEqual(30);
      expect(numberOf(left, 'flatnessDb')).toBeLessThan(0.01);
      expect(numberOf(left, 'noiseAndDistortionDb')).toBeLessThan(-120);
    },
  );

  // Closed form of one pole by the bilinear transform: frequencies stand as their tangents.
  it('follows a pole at 2 kHz', async () => {
    const { channels } = await play([
      { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 2000, order: 1 },
    ]);
    const [left] = (await measure(channels)).channels;
    const tangent = (f: number): number => Math.tan((Math.PI * f) / RATE_HZ);
    const gain = (f: number): number => -10 * Math.log10(1 + (tangent(f) / tangent(2000)) ** 2);
    expect(greatestLevel(left, (f) => gain(f) - gain(1000))).toBeLessThan(0.01);
  });

  it('of a file at 96 kHz recorded at 44.1 kHz reaches 0.45 of the recorder’s rate', async () => {
    const { channels } = await play([], {}, 96_000);
    const heard = resampleByFft(channels[0], 96_000, 44_100);
    const [left] = (await measure([heard], {}, 44_100)).channels;
    const { x } = left.traces['response'];
    expect(x[x.length - 1]).toBeLessThanOrEqual(0.45 * 44_100);
    expect(greatestLevel(left, () => 0)).toBeLessThan(0.01);
  });
});

describe('what stands between the tones', () => {
  it('is the noise there is, in power', async () => {
    const { channels } = await play([noise(-80)]);
    const record = await measure(channels);
    const [left] = record.channels;
    // White noise of -80 dBFS over 24 kHz: 0.796 dB less in 19,980 Hz. The tones' power by the stimulus's own samples.
    const { channels: clean } = await play([]);
    const middle = clean[0].slice(4 * RATE_HZ, 9 * RATE_HZ);
    const tonesDb = 10 * Math.log10((2 * middle.reduce((sum, x) => sum + x * x, 0)) / middle.length);
    expect(Math.abs(numberOf(left, 'noiseAndDistortionDb') - (-80.796 - tonesDb))).toBeLessThan(0.15);
    expect(left.uncertainty['noiseAndDistortionDb'].expanded).toBeLessThan(0.2);
  });

  it('grows by 20 dB for a cube ten times as strong', async () => {
    const read = async (a3: number): Promise<number> => {
      const { channels } = await play([{ kind: 'polynomial', channel: 'both', coefficients: [1, 0, a3] }]);
      return numberOf((await measure(channels)).channels[0], 'noiseAndDistortionDb');
    };
    // Products of a cube stand in proportion to its coefficient.
    expect((await read(1e-3)) - (await read(1e-4))).toBeCloseTo(20, 0);
  });
});

describe('combs as recorded', () => {
  it('found by marks, at any delay, gain and polarity', async () => {
    const { channels } = await play([
      { kind: 'gain', channel: 'both', gainDb: -12 },
      { kind: 'polarity', channel: 'both' },
      { kind: 'clock', channel: 'both', ppm: -190 },
      { kind: 'lead', channel: 'both', seconds: 0.5 },
      noise(-110),
    ]);
    const record = await measure(channels);
    expect(record.stimulus).toMatchObject({ recognisedBy: 'marks', polarity: 'inverted' });
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) + 190)).toBeLessThan(0.5);
    expect(greatestLevel(record.channels[0], () => 0)).toBeLessThan(0.05);
  });

  it('without marks or descriptor', async () => {
    const { channels } = await play([{ kind: 'clock', channel: 'both', ppm: 77 }, noise(-110)], {
      isBare: true,
    });
    const record = await measure(channels);
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) - 77)).toBeLessThan(1);
    expect(greatestLevel(record.channels[0], () => 0)).toBeLessThan(0.05);
  });

  it('with a silent channel', async () => {
    const { channels } = await play([], { channels: 'left' });
    const record = await measure(channels);
    expect(record.channels[1].figures['flatnessDb']).toBeNull();
    expect(warningCodes(record)).toContain('channel-silent');
  });

  it('are nothing measurable in a single tone', async () => {
    const tone = Float64Array.from({ length: 3 * RATE_HZ }, (_, n) => 0.5 * Math.sin(0.13 * n));
    await expect(measure([tone])).rejects.toMatchObject({ code: 'NOTHING_MEASURABLE' });
  });
});
