import { describe, expect, it } from 'vitest';
import published from '../../../../test-vectors/jitter/jitter.json' with { type: 'json' };
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { mix, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { jitterMeasure } from './jitter-measure.js';
import { patternLines } from './pattern-lines.js';

const RATE_HZ = 44_100;
const TONE_HZ = 11_025;

/** A tone read at moments that a sine moves by `peakS`: the definition of sampling jitter. */
function shaken(seconds: number, peakS: number, jitterHz: number, rate = RATE_HZ, toneHz = TONE_HZ) {
  return Float64Array.from({ length: seconds * rate }, (_, n) => {
    const t = n / rate;
    return 0.7 * Math.sin(2 * Math.PI * toneHz * (t + peakS * Math.sin(2 * Math.PI * jitterHz * t)) + 0.4);
  });
}

const measure = async (samples: Float64Array, rate = RATE_HZ) =>
  (await analyseSamples(jitterMeasure, [samples], rate)).channels[0];

async function play(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}, rate = 48_000) {
  const { source } = createStimulus('jitter-test', { sampleRateHz: rate, bitsPerSample: 24, ...options });
  return pass(await source.read(0, source.frameCount), rate, stages);
}

describe('sinusoidal jitter', () => {
  // Published rows for 11,025 Hz (rule and Bessel functions agree to 1e-4 dB there).
  const rows = published.rows.filter(({ f0Hz, peakJitterS }) => f0Hz === TONE_HZ && peakJitterS <= 1e-8);

  it.each(rows)(
    'of $peakJitterS s peak at 11,025 Hz',
    async ({ peakJitterS, ppS, rmsS, sidebandDbcExact }) => {
      const left = await measure(shaken(8, peakJitterS, 233.7));
      // 2 % is the tolerance; without noise it is far better.
      expect(numberOf(left, 'jitterPeakToPeakPs') / (ppS * 1e12)).toBeCloseTo(1, 3);
      expect(numberOf(left, 'jitterRmsPs') / (rmsS * 1e12)).toBeCloseTo(1, 3);
      // At 10 ns the second pair of the Bessel series stands out too, 80 dB under the first.
      expect(left.components.length).toBeLessThanOrEqual(peakJitterS < 5e-9 ? 1 : 2);
      expect(left.components[0]['kind']).toBe('phase');
      expect(Number(left.components[0]['offsetHz'])).toBeCloseTo(233.7, 1);
      expect(Number(left.components[0]['levelDbr'])).toBeCloseTo(sidebandDbcExact, 2);
    },
  );

  it('of several frequencies adds up as squares', async () => {
    const samples = Float64Array.from({ length: 8 * RATE_HZ }, (_, n) => {
      const t = n / RATE_HZ;
      const shake = 3e-10 * Math.sin(2 * Math.PI * 61 * t) + 4e-10 * Math.sin(2 * Math.PI * 1010 * t + 1);
      return 0.7 * Math.sin(2 * Math.PI * TONE_HZ * (t + shake));
    });
    // 300 and 400 ps peak make 500 (root of squares), 1000 ps peak to peak.
    expect(numberOf(await measure(samples), 'jitterPeakToPeakPs')).toBeCloseTo(1000, 0);
  });

  it('stays within 2 % in noise', async () => {
    const clean = shaken(8, 2e-10, 240);
    const left = await measure(mix(clean, whiteNoise(clean.length, 1e-5, 4)));
    expect(Math.abs(numberOf(left, 'jitterPeakToPeakPs') / 400 - 1)).toBeLessThan(0.02);
  });
});

describe('what is not jitter', () => {
  it('amplitude modulation is told as such and not counted', async () => {
    const samples = Float64Array.from({ length: 8 * RATE_HZ }, (_, n) => {
      const t = n / RATE_HZ;
      return 0.5 * (1 + 2e-4 * Math.cos(2 * Math.PI * 100 * t)) * Math.sin(2 * Math.PI * TONE_HZ * t);
    });
    const left = await measure(samples);
    expect(left.components[0]).toMatchObject({ kind: 'amplitude' });
    // Half of the depth on either side (closed form of a product of sines).
    expect(Number(left.components[0]['levelDbr'])).toBeCloseTo(20 * Math.log10(1e-4), 2);
    expect(left.figures['jitterPeakToPeakPs']).toBeNull();
  });

  it('both at once are mixed, the moving part alone counts', async () => {
    const samples = Float64Array.from({ length: 8 * RATE_HZ }, (_, n) => {
      const t = n / RATE_HZ;
      const slow = Math.cos(2 * Math.PI * 100 * t);
      return 0.5 * (1 + 2e-5 * slow) * Math.sin(2 * Math.PI * TONE_HZ * (t + 2e-10 * slow));
    });
    const left = await measure(samples);
    expect(left.components[0]).toMatchObject({ kind: 'mixed' });
    expect(numberOf(left, 'jitterPeakToPeakPs')).toBeCloseTo(400, 0);
  });

  it('the pattern’s own lines: as published, and not counted', async () => {
    // Published, exact transform of the 192-sample cycle: 16 bits -123.79 and -124.07 dB, 24 bits -171.95 and -172.24.
    const lines = [16, 24].map(patternLines);
    const db = (ratio: number): number => 20 * Math.log10(ratio);
    expect(db(lines[0].lower[1])).toBeCloseTo(-123.79, 2);
    expect(db(lines[0].upper[1])).toBeCloseTo(-124.07, 2);
    expect(db(lines[0].lower[3])).toBeCloseTo(-123.49, 2);
    expect(db(lines[1].lower[1])).toBeCloseTo(-171.95, 2);
    const channels = await play([], { bitsPerSample: 16 });
    const [left] = (await analyseSamples(jitterMeasure, channels, 48_000)).channels;
    expect(left.figures['jitterPeakToPeakPs']).toBeNull();
    expect(left.components).toEqual([]);
  });
});

describe('the jitter test as recorded', () => {
  it('through a device with jitter, marks, clock and noise', async () => {
    const channels = await play([
      { kind: 'jitter', channel: 'both', peakToPeakPs: 1500, frequencyHz: 333 },
      { kind: 'clock', channel: 'both', ppm: -60 },
      { kind: 'gain', channel: 'both', gainDb: -4 },
      { kind: 'noise', channel: 'both', levelDbfs: -105 },
    ]);
    const record = await analyseSamples(jitterMeasure, channels, 48_000, { bits: 24 });
    expect(record.stimulus).toMatchObject({ name: 'jitter-test', recognisedBy: 'marks' });
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) + 60)).toBeLessThan(0.5);
    for (const channel of record.channels) {
      expect(Math.abs(numberOf(channel, 'jitterPeakToPeakPs') / 1500 - 1)).toBeLessThan(0.02);
    }
  });

  it('without any pair is bounded by its noise', async () => {
    const channels = await play([{ kind: 'noise', channel: 'both', levelDbfs: -100 }]);
    const record = await analyseSamples(jitterMeasure, channels, 48_000);
    const [left] = record.channels;
    expect(left.figures['jitterPeakToPeakPs']).toBeNull();
    expect(left.limits['jitterPeakToPeakPs'].below).toBeGreaterThan(1);
    expect(left.limits['jitterPeakToPeakPs'].below).toBeLessThan(300);
    expect(warningCodes(record)).toContain('no-sidebands');
    const { x } = left.traces['closeIn'];
    expect(x[0]).toBeGreaterThanOrEqual(-5000);
    expect(x[x.length - 1]).toBeLessThanOrEqual(5000);
  });

  it('is nothing measurable without a tone', async () => {
    await expect(measure(whiteNoise(3 * RATE_HZ, 0.1, 1))).rejects.toMatchObject({
      code: 'NOTHING_MEASURABLE',
    });
  });
});
