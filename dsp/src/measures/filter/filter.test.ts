import { describe, expect, it } from 'vitest';
import reference from '../../../../test-vectors/filter/butterworth.json' with { type: 'json' };
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { BenchRecord } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { sine } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { filterMeasure } from './filter-measure.js';

const RATE_HZ = 48_000;

async function play(options: Partial<StimulusOptions> = {}) {
  const stimulus = createStimulus('white-noise', { sampleRateHz: RATE_HZ, bitsPerSample: 24, ...options });
  const { source } = stimulus;
  return { channels: await source.read(0, source.frameCount), descriptor: stimulus.describe('') };
}

async function filtered(stages: readonly PracticeStage[], options: Partial<StimulusOptions> = {}) {
  const rate = options.sampleRateHz ?? RATE_HZ;
  const { channels, descriptor } = await play(options);
  return analyseSamples(filterMeasure, pass(channels, rate, stages), rate, { descriptor });
}

function at({ channels: [left] }: BenchRecord, frequencyHz: number): number {
  const { x, y } = left.traces['response'];
  const k = Math.max(
    1,
    Array.from(x).findIndex((value) => value >= frequencyHz),
  );
  const share = Math.log(frequencyHz / x[k - 1]) / Math.log(x[k] / x[k - 1]);
  return y[k - 1] + share * (y[k] - y[k - 1]);
}

/** Each sample held for R samples of the recorder, as a converter without a filter does. */
const hold = (samples: Float64Array, times: number): Float64Array =>
  Float64Array.from({ length: samples.length * times }, (_, n) => samples[Math.floor(n / times)]);

/** Gain of that: sin(πf/fs) / (R sin(πf/(R fs))), the sum of a geometric series. */
const heldGain = (share: number, times: number): number =>
  Math.sin(Math.PI * share) / (times * Math.sin((Math.PI * share) / times));

function heldPower(low: number, high: number, times: number): number {
  const points = 2000;
  let sum = 0;
  for (let n = 0; n < points; n++) sum += heldGain(low + ((n + 0.5) * (high - low)) / points, times) ** 2;
  return sum / points;
}

// Each point is known to 0.1 dB and the reference to as much: four standard deviations of both.
const POINT_DB = 0.57;

describe('filter', () => {
  it('finds no more ripple in a straight wire than noise makes, and says so', async () => {
    const record = await filtered([]);
    const [left] = record.channels;
    // Closed form: flat. Extremes of some hundred Gaussian points at 0.14 dB span 0.85 dB.
    expect(numberOf(left, 'passBandRippleDb')).toBeLessThan(1);
    expect(left.figures['minus3DbHighHz']).toBeNull();
    expect(left.figures['imageRejectionDb']).toBeNull();
    expect(warningCodes(record)).toEqual(
      expect.arrayContaining(['ripple-in-noise', 'no-half-power-point', 'images-out-of-reach']),
    );
    expect(left.limits['passBandRippleDb'].by).toBe('noise');
  });

  it.each(reference.rows)(
    'agrees with scipy on a Butterworth of order $order at $cornerHz Hz',
    async (row) => {
      const { order, cornerHz, points } = row;
      const record = await filtered(
        [{ kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: cornerHz, order }],
        { sampleRateHz: reference.sampleRateHz },
      );
      const zero = points.find(({ frequencyHz }) => frequencyHz === 1000)?.levelDb ?? Number.NaN;
      for (const { frequencyHz, levelDb } of points) {
        expect(Math.abs(at(record, frequencyHz) - (levelDb - zero))).toBeLessThan(POINT_DB);
      }
      const edge = numberOf(record.channels[0], 'minus3DbHighHz');
      // 0.57 dB over the slope there, which is 3.01 dB times the order an octave (Butterworth at its corner).
      expect(Math.abs(Math.log2(edge / cornerHz))).toBeLessThan(POINT_DB / (3.01 * order));
      const { expanded } = record.channels[0].uncertainty['minus3DbHighHz'];
      expect(expanded).toBeGreaterThan(0);
      expect(expanded).toBeLessThan(0.2 * cornerHz);
    },
  );

  it('reads a peak of 3 dB as ripple', async () => {
    const record = await filtered([
      { kind: 'filter', channel: 'both', type: 'peak', frequencyHz: 8000, q: 1, gainDb: 3 },
    ]);
    // Closed form: the peak's own gain in dB; noise adds up to its own range.
    expect(Math.abs(numberOf(record.channels[0], 'passBandRippleDb') - 3)).toBeLessThan(0.8);
    expect(Math.abs(at(record, 8000) - 3)).toBeLessThan(POINT_DB);
    expect(record.channels[0].limits['passBandRippleDb']).toBeUndefined();
  });

  it.each([
    [44_100, 4],
    [48_000, 2],
    [48_000, 4],
  ])(
    'shows droop and images of a player of %d Hz without a filter, recorded at %d times that',
    async (rate, times) => {
      const { channels, descriptor } = await play({ sampleRateHz: rate });
      const played = channels.map((samples) => hold(samples, times));
      const record = await analyseSamples(filterMeasure, played, rate * times, { descriptor });
      for (const frequencyHz of [5000, 15_000, 0.44 * rate]) {
        const expected = 20 * Math.log10(heldGain(frequencyHz / rate, times) / heldGain(1000 / rate, times));
        expect(Math.abs(at(record, frequencyHz) - expected)).toBeLessThan(POINT_DB);
      }
      const images = 10 * Math.log10(heldPower(0.25, 0.45, times) / heldPower(0.55, 0.75, times));
      // Both bands are a fifth of the rate wide: their means are known to 0.02 dB.
      expect(Math.abs(numberOf(record.channels[0], 'imageRejectionDb') - images)).toBeLessThan(0.1);
    },
  );

  it('tells the player’s rate by where the noise ends, without a descriptor', async () => {
    const { channels } = await play();
    const played = channels.map((samples) => hold(samples, 4));
    const steep: PracticeStage = {
      kind: 'filter',
      channel: 'both',
      type: 'low-pass',
      frequencyHz: 21_000,
      order: 12,
    };
    const record = await analyseSamples(filterMeasure, pass(played, 192_000, [steep]), 192_000);
    // Closed form: 10 lg(1 + (f/fc)^24) of a Butterworth of order 12, warped by less than 1 % at this rate, and the hold's.
    const steepPower = (hz: number): number => 1 / (1 + (hz / 21_000) ** 24);
    const levelDb = (hz: number): number =>
      20 * Math.log10(heldGain(hz / 48_000, 4) / heldGain(1000 / 48_000, 4)) +
      10 * Math.log10(steepPower(hz));
    let edgeHz = 1000;
    while (levelDb(edgeHz) > -3) edgeHz += 1;
    // The slope there is 0.5 dB per percent and more: 0.57 dB is less than 1.5 %.
    expect(Math.abs(numberOf(record.channels[0], 'minus3DbHighHz') / edgeHz - 1)).toBeLessThan(0.015);
    // All of the images lie above 0.55 of 48 kHz, where the filter takes 24 dB and the hold leaves less than in the band.
    expect(numberOf(record.channels[0], 'imageRejectionDb')).toBeGreaterThan(
      -10 * Math.log10(steepPower(26_400)),
    );
    expect(warningCodes(record)).not.toContain('images-out-of-reach');
  });

  it('of a tenth of a second shows its noise, and says that it is noise', async () => {
    const { channels } = await play({ isBare: true });
    const record = await analyseSamples(filterMeasure, [channels[0].slice(24_000, 28_800)], RATE_HZ);
    const [left] = record.channels;
    // Closed form: flat. A sixteenth of 20 kHz for 0.1 s is known to 0.4 dB at best, and its extremes lie further apart.
    expect(numberOf(left, 'passBandRippleDb')).toBeGreaterThan(0.4);
    expect(left.limits['passBandRippleDb'].by).toBe('noise');
    expect(left.uncertainty['passBandRippleDb'].standard).toBeGreaterThan(0.4);
  });

  it('leaves a silent channel out, and refuses what isn’t noise', async () => {
    const { channels } = await play({ isBare: true });
    const record = await analyseSamples(
      filterMeasure,
      [channels[0], new Float64Array(channels[0].length)],
      RATE_HZ,
    );
    expect(record.channels[1].figures['passBandRippleDb']).toBeNull();
    expect(warningCodes(record)).toContain('channel-silent');
    await expect(
      analyseSamples(filterMeasure, [sine(RATE_HZ * 2, RATE_HZ, 997, 0.5)], RATE_HZ),
    ).rejects.toMatchObject({ code: 'NOTHING_MEASURABLE' });
  });
});
