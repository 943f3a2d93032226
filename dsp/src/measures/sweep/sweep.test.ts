import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../../practice/device.js';
import { pass } from '../../practice/testing/pass.js';
import type { ChannelResult } from '../../record/record.js';
import { createStimulus } from '../../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../../stimulus/stimulus-options.js';
import { mix, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes, type AnalyseOptions } from '../testing/analyse-samples.js';
import { sweepMeasure } from './sweep-measure.js';

const RATE_HZ = 96_000;
const noise = (levelDbfs: number): PracticeStage => ({ kind: 'noise', channel: 'both', levelDbfs });
const lead: PracticeStage = { kind: 'lead', channel: 'both', seconds: 0.6 };

async function play(
  stages: readonly PracticeStage[],
  options: Partial<StimulusOptions> = {},
  rate = RATE_HZ,
) {
  const { source, describe: describeFile } = createStimulus('sweep', {
    sampleRateHz: rate,
    bitsPerSample: 24,
    ...options,
  });
  const channels = pass(await source.read(0, source.frameCount), rate, stages);
  return { channels, descriptor: describeFile('') };
}

const measure = (channels: readonly Float64Array[], options: AnalyseOptions = {}, rate = RATE_HZ) =>
  analyseSamples(sweepMeasure, channels, rate, options);

function at(channel: ChannelResult, trace: string, frequencyHz: number): number {
  const { x, y } = channel.traces[trace];
  const k = Array.from(x).findIndex((value) => value >= frequencyHz);
  const share = Math.log(frequencyHz / x[k - 1]) / Math.log(x[k] / x[k - 1]);
  return y[k - 1] + share * (y[k] - y[k - 1]);
}

function greatest(
  channel: ChannelResult,
  trace: string,
  low: number,
  high: number,
  of: (x: number, y: number) => number,
) {
  const { x, y } = channel.traces[trace];
  let most = 0;
  for (let k = 0; k < x.length; k++) {
    if (x[k] >= low && x[k] <= high) most = Math.max(most, Math.abs(of(x[k], y[k])));
  }
  return most;
}

describe('a straight wire', () => {
  it.each([44_100, 48_000, 96_000, 192_000])(
    'is flat to 0.01 dB from 20 Hz to 0.45 of %d Hz',
    async (rate) => {
      const { channels } = await play([], {}, rate);
      const [left, right] = (await measure(channels, {}, rate)).channels;
      for (const channel of [left, right]) {
        // The tolerance of the closed form, noiseless.
        expect(greatest(channel, 'response', 20, 0.45 * rate, (_, y) => y)).toBeLessThan(0.01);
        expect(numberOf(channel, 'flatnessDb')).toBeLessThan(0.01);
        expect(greatest(channel, 'phase', 30, 0.4 * rate, (_, y) => y)).toBeLessThan(0.5);
      }
    },
  );

  it('stays so at any delay, gain, polarity and clock', async () => {
    const { channels } = await play([
      { kind: 'gain', channel: 'both', gainDb: -9 },
      { kind: 'polarity', channel: 'both' },
      { kind: 'clock', channel: 'both', ppm: 185 },
      { kind: 'delay', channel: 'both', samples: 321.4 },
      lead,
    ]);
    const record = await measure(channels);
    const [left] = record.channels;
    expect(greatest(left, 'response', 20, 0.45 * RATE_HZ, (_, y) => y)).toBeLessThan(0.01);
    // With the clock corrected the phase is a straight line at 180°.
    expect(greatest(left, 'phase', 50, 20_000, (_, y) => y - 180)).toBeLessThan(1);
    expect(record.stimulus).toMatchObject({ recognisedBy: 'marks', polarity: 'inverted' });
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) - 185)).toBeLessThan(0.5);
    // One hundredth of a sample.
    expect(Math.abs((record.stimulus?.delayS ?? 0) - (0.6 + 321.4 / RATE_HZ))).toBeLessThan(0.02 / RATE_HZ);
  });

  it('stays within 0.05 dB in noise 100 dB below full scale', async () => {
    const { channels } = await play([noise(-100)]);
    const [left] = (await measure(channels)).channels;
    expect(greatest(left, 'response', 20, 20_000, (_, y) => y)).toBeLessThan(0.05);
  });
});

describe('what noise leaves open', () => {
  // The scatter of repeats is the check: type A against the type B that each record claims (JCGM 100:2008, 4.2 and 4.3).
  it('is claimed as repeats scatter', async () => {
    const keys = ['flatnessDb', 'minus3DbHighHz', 'levelAt20HzDb', 'levelAt20kHzDb'] as const;
    const values = new Map<string, number[]>(keys.map((key) => [key, []]));
    const claimed = new Map<string, number[]>(keys.map((key) => [key, []]));
    const shape = { type: 'low-pass', frequencyHz: 12_000, order: 1 } as const;
    const { channels: quiet } = await play([{ kind: 'filter', channel: 'both', ...shape }], {}, 48_000);
    for (let seed = 1; seed <= 8; seed++) {
      const noisy = quiet.map((samples, n) =>
        mix(samples, whiteNoise(samples.length, Math.SQRT1_2 * 10 ** (-40 / 20), 2 * seed + n)),
      );
      for (const channel of (await measure(noisy, {}, 48_000)).channels) {
        for (const key of keys) {
          values.get(key)?.push(numberOf(channel, key));
          claimed.get(key)?.push(channel.uncertainty[key].standard);
        }
      }
    }
    for (const key of keys) {
      const drawn = values.get(key) ?? [];
      const mean = drawn.reduce((sum, value) => sum + value, 0) / drawn.length;
      const spread = Math.sqrt(
        drawn.reduce((sum, value) => sum + (value - mean) ** 2, 0) / (drawn.length - 1),
      );
      const claim = Math.sqrt((claimed.get(key) ?? []).reduce((sum, u) => sum + u * u, 0) / drawn.length);
      // Sixteen draws know their spread to 18 %: three times that, either way. A span's ends and the first point below -3 dB
      // are picked among many that noise moves, and scatter less than one of them.
      const isPicked = key === 'flatnessDb' || key === 'minus3DbHighHz';
      expect(spread / claim, key).toBeLessThan(1.55);
      expect(spread / claim, key).toBeGreaterThan(isPicked ? 0.2 : 0.45);
    }
  }, 60_000);
});

describe('known filters', () => {
  // Closed form: one pole at 1 kHz is -3.0103 dB and -45° there, -20.043 dB at 10 kHz.
  it('a pole at 1 kHz', async () => {
    const { channels } = await play([
      { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 1000, order: 1 },
    ]);
    const [left] = (await measure(channels)).channels;
    const gain = (ratio: number): number => -10 * Math.log10(1 + ratio ** 2);
    expect(gain(1)).toBeCloseTo(-3.0103, 4);
    expect(gain(10)).toBeCloseTo(-20.043, 3);
    // The device's filter is made of samples by the bilinear transform: frequencies stand as their tangents.
    const tangent = (f: number): number => Math.tan((Math.PI * f) / RATE_HZ);
    for (const f of [20, 100, 500, 2000, 5000, 10_000, 20_000]) {
      const expected = gain(tangent(f) / tangent(1000)) - gain(1);
      expect(Math.abs(at(left, 'response', f) - expected)).toBeLessThan(0.01);
    }
    // The delay that is taken out is known to half a microsecond: 0.2° at 1 kHz. -45.000° at the corner, and by the bilinear transform -atan of the tangents' ratio anywhere.
    for (const f of [100, 500, 1000, 3000, 10_000]) {
      const expected = (-180 / Math.PI) * Math.atan(tangent(f) / tangent(1000));
      expect(Math.abs(at(left, 'phase', f) - expected)).toBeLessThan(f <= 1000 ? 0.2 : 2);
    }
  });

  it('half-power points by their frequencies', async () => {
    const { channels } = await play([
      { kind: 'filter', channel: 'both', type: 'high-pass', frequencyHz: 40, order: 2 },
      { kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 12_000, order: 2 },
    ]);
    const [left] = (await measure(channels)).channels;
    // Butterworth: -3.0103 dB at the corner, so -3 dB lies 0.2 % inside; 1 kHz itself is down by 1e-4 dB.
    expect(Math.abs(numberOf(left, 'minus3DbLowHz') / 40 - 1)).toBeLessThan(0.01);
    expect(Math.abs(numberOf(left, 'minus3DbHighHz') / 12_000 - 1)).toBeLessThan(0.02);
    // Closed form of the second order: 10 lg(1 + (40/20)^4) = 12.30 dB down at 20 Hz.
    expect(numberOf(left, 'levelAt20HzDb')).toBeCloseTo(-12.3, 1);
  });

  it('a peak of 3 dB at 3 kHz', async () => {
    const { channels } = await play([
      { kind: 'filter', channel: 'left', type: 'peak', frequencyHz: 3000, q: 2, gainDb: 3 },
    ]);
    const [left, right] = (await measure(channels)).channels;
    expect(at(left, 'response', 3000) - at(left, 'response', 100)).toBeCloseTo(3, 1);
    expect(numberOf(right, 'flatnessDb')).toBeLessThan(0.01);
  });
});

describe('harmonics against frequency', () => {
  // Closed form of y = u + 0.01u² + 0.02u³ at a peak of 0.5: H1 0.501875, H2 0.00125, H3 0.000625.
  it('read as the closed form from 200 Hz on', async () => {
    const { channels } = await play(
      [{ kind: 'polynomial', channel: 'both', coefficients: [1, 0.01, 0.02] }],
      { levelDbfs: 20 * Math.log10(0.5) },
    );
    const [left] = (await measure(channels)).channels;
    const second = 20 * Math.log10(0.00125 / 0.501875);
    // The cube's own share at the fundamental is 3/4 a3 A² more: the third is a3 A³/4 over it.
    const third = 20 * Math.log10(0.000625 / 0.501875);
    expect(greatest(left, 'harmonic2', 200, 15_000, (_, y) => y - second)).toBeLessThan(0.01);
    expect(greatest(left, 'harmonic3', 200, 12_000, (_, y) => y - third)).toBeLessThan(0.01);
  });

  it('of a straight wire lie below -120 dB', async () => {
    const { channels } = await play([]);
    const [left] = (await measure(channels)).channels;
    expect(greatest(left, 'harmonic2', 100, 15_000, (_, y) => Math.max(0, y + 120))).toBe(0);
  });
});

describe('recordings of other kinds', () => {
  it('a file at 44.1 kHz recorded at 96 kHz is measured to 0.45 of its own rate', async () => {
    const { source } = createStimulus('sweep', { sampleRateHz: 44_100, bitsPerSample: 24 });
    const played = (await source.read(0, source.frameCount))[0];
    // Rates that stand as 147 to 320: the band-limited series between the samples is the recording.
    const { resampleByFft } = await import('../testing/resample.js');
    const recorded = resampleByFft(played, 44_100, 96_000);
    const record = await measure([recorded, recorded]);
    expect(greatest(record.channels[0], 'response', 20, 0.45 * 44_100, (_, y) => y)).toBeLessThan(0.01);
    expect(record.stimulus).toMatchObject({ name: 'sweep', recognisedBy: 'marks' });
  });

  it('a file at 96 kHz recorded at 48 kHz is measured to 0.45 of the recorder’s', async () => {
    const { source } = createStimulus('sweep', { sampleRateHz: 96_000, bitsPerSample: 24 });
    const played = (await source.read(0, source.frameCount))[0];
    const { resampleByFft } = await import('../testing/resample.js');
    const recorded = resampleByFft(played, 96_000, 48_000);
    const [left] = (await measure([recorded], {}, 48_000)).channels;
    expect(greatest(left, 'response', 20, 0.45 * 48_000, (_, y) => y)).toBeLessThan(0.02);
  });

  it('without marks, with its descriptor, at any place', async () => {
    const { channels, descriptor } = await play([lead, noise(-100)], { isBare: true });
    const record = await measure(channels, { descriptor });
    expect(record.stimulus?.delayS).toBeCloseTo(0.6, 4);
    expect(greatest(record.channels[0], 'response', 20, 20_000, (_, y) => y)).toBeLessThan(0.05);
    expect(record.stimulus?.polarity).toBe('same');
  });

  it.each([123, -180])('without marks, the clocks %d ppm apart: told by the sweep itself', async (ppm) => {
    const { channels, descriptor } = await play(
      [
        { kind: 'polarity', channel: 'both' },
        { kind: 'clock', channel: 'both', ppm },
        { kind: 'lead', channel: 'both', seconds: 1 },
        noise(-105),
      ],
      { isBare: true },
    );
    const record = await measure(channels, { descriptor });
    // One part in a million, a hundredth of a sample.
    expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) - ppm)).toBeLessThan(1);
    expect(Math.abs((record.stimulus?.delayS ?? 0) - 1) * RATE_HZ).toBeLessThan(0.05);
    expect(record.stimulus?.polarity).toBe('inverted');
    expect(greatest(record.channels[0], 'phase', 100, 20_000, (_, y) => y - 180)).toBeLessThan(2);
  });

  it('with neither marks nor descriptor: recognised by its rise', async () => {
    const { channels } = await play([lead, noise(-95)], { isBare: true });
    const record = await measure(channels);
    expect(warningCodes(record)).toContain('stimulus-assumed');
    expect(greatest(record.channels[0], 'response', 30, 20_000, (_, y) => y)).toBeLessThan(0.1);
  });

  it('that ended early say above which frequency they say nothing', async () => {
    const { channels, descriptor } = await play([noise(-100)]);
    const end = Math.round((descriptor.parts[0].fromS + 6) * RATE_HZ);
    const record = await measure(channels.map((samples) => samples.slice(0, end)));
    expect(record.warnings.find(({ code }) => code === 'sweep-cut')?.message).toMatch(/above \d+ Hz/);
    expect(greatest(record.channels[0], 'response', 50, 1000, (_, y) => y)).toBeLessThan(0.3);
  });

  it('with one channel silent', async () => {
    const { channels } = await play([], { channels: 'left' });
    const record = await measure(channels);
    expect(record.channels[1].figures['flatnessDb']).toBeNull();
    expect(warningCodes(record)).toContain('channel-silent');
  });

  it('are refused when there is no sweep', async () => {
    const tone = Float64Array.from({ length: 5 * RATE_HZ }, (_, n) => 0.5 * Math.sin(0.13 * n));
    await expect(measure([tone])).rejects.toMatchObject({ code: 'NOT_RECOGNISED' });
  });
});
