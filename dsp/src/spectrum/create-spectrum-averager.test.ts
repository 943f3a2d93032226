import { expect, it } from 'vitest';
import gain from '../../../test-vectors/spectrum/process-gain.json' with { type: 'json' };
import { meanSquareToDbfs, powerToDb } from '../level/decibel.js';
import { mix, sine, whiteNoise } from '../testing/signals.js';
import { createWindow } from '../window/create-window.js';
import { createSpectrumAverager, suggestedOverlap } from './create-spectrum-averager.js';
import { levelSpectrumDbfs } from './power-spectrum.js';

const BASE = {
  sampleRateHz: 48_000,
  fftLength: 1024,
  windowName: 'blackman-harris-7',
  overlap: 0.75,
} as const;

function average(samples: Float64Array, options: Partial<Parameters<typeof createSpectrumAverager>[0]> = {}) {
  const averager = createSpectrumAverager({ ...BASE, ...options });
  averager.push(samples);
  return averager.finish();
}

const sumOf = (values: Float64Array): number => values.reduce((sum, value) => sum + value, 0);

it('sums to the mean square of the windowed segment over that of the window', () => {
  const samples = whiteNoise(1024, 0.1, 5);
  const window = createWindow('blackman-harris-7', 1024);
  let weighted = 0;
  samples.forEach((value, n) => (weighted += (value * window.samples[n]) ** 2));
  const spectrum = average(samples);
  expect(spectrum.averages).toBe(1);
  // Parseval's identity, exact but for rounding.
  expect(sumOf(spectrum.power) / (weighted / 1024 / window.powerGain) - 1).toBeCloseTo(0, 12);
});

it('gives the same whatever the size of the blocks', () => {
  const samples = whiteNoise(10_000, 0.1, 6);
  const whole = average(samples);
  for (const size of [1, 7, 256, 1024, 4096]) {
    const averager = createSpectrumAverager(BASE);
    for (let n = 0; n < samples.length; n += size) averager.push(samples.subarray(n, n + size));
    expect(averager.finish()).toEqual(whole);
  }
});

it('aligns the last segment to the end: what happens in the last samples is seen', () => {
  const samples = new Float64Array(1024 + 300);
  samples[1024 + 150] = 1;
  const spectrum = average(samples, { overlap: 0, windowName: 'rectangular' });
  expect(spectrum.averages).toBe(2);
  // One sample of 1 in the second of two segments of 1024.
  expect(sumOf(spectrum.power) * 2 * 1024).toBeCloseTo(1, 12);
});

it('takes one segment only when the data are as long as it', () => {
  expect(average(whiteNoise(1024, 1, 1)).averages).toBe(1);
  expect(average(whiteNoise(1024, 1, 1)).effectiveAverages).toBe(1);
  expect(average(whiteNoise(2048, 1, 1)).averages).toBe(5);
});

it('refuses fewer samples than a segment, and an overlap of 1', () => {
  const averager = createSpectrumAverager(BASE);
  averager.push(new Float64Array(1023));
  expect(() => averager.finish()).toThrow(expect.objectContaining({ code: 'SEGMENT_TOO_SHORT' }));
  expect(() => createSpectrumAverager({ ...BASE, overlap: 1 })).toThrow(
    expect.objectContaining({ code: 'BAD_ARGUMENT' }),
  );
});

// Process gain: derived from the definitions, test-vectors/spectrum.
it('shows white noise lower by the process gain, and its total right', () => {
  const row = gain.rows.find(({ fftLength }) => fftLength === 16_384)!;
  const spectrum = average(whiteNoise(1 << 20, 1e-4, 9), { fftLength: 16_384 });
  const totalDbfs = meanSquareToDbfs(sumOf(spectrum.power));
  const levels = levelSpectrumDbfs(spectrum);
  let mean = 0;
  for (let k = 20; k < 8172; k++) mean += 10 ** (levels[k] / 10) / (8172 - 20);
  // 2^20 samples: the mean square has a standard deviation of 0.006 dB; five of them.
  expect(Math.abs(totalDbfs + 76.98970004)).toBeLessThan(0.03);
  expect(Math.abs(totalDbfs - powerToDb(mean) - row.processGainDb['blackman-harris-7'])).toBeLessThan(0.03);
});

it('keeps a line and lowers the noise by 3 dB when the length doubles', () => {
  const samples = mix(sine(1 << 19, 48_000, 3000, 0.1), whiteNoise(1 << 19, 1e-4, 10));
  const [short, long] = [8192, 16_384].map((fftLength) => levelSpectrumDbfs(average(samples, { fftLength })));
  expect(long[1024] - short[512]).toBeCloseTo(0, 3);
  const floor = (levels: Float64Array): number => {
    const half = Array.from(levels.subarray(levels.length >> 1, -20));
    return powerToDb(half.reduce((sum, level) => sum + 10 ** (level / 10), 0) / half.length);
  };
  // Half the band of 2^19 samples: standard deviation 0.012 dB in each.
  expect(Math.abs(floor(long) - floor(short) + 3.0103)).toBeLessThan(0.08);
});

it.each(['hann', 'blackman-harris-7', 'hft248d'] as const)(
  'counts what overlapped %s segments are worth',
  (windowName) => {
    const overlap = suggestedOverlap(windowName);
    const spectrum = average(whiteNoise(1 << 19, 1, 11), { windowName, overlap, fftLength: 512 });
    const inner = spectrum.power.subarray(20, -20);
    const mean = sumOf(inner) / inner.length;
    const variance = inner.reduce((sum, value) => sum + (value - mean) ** 2, 0) / inner.length;
    // 216 bins, every few of them independent: the variance is known to about 15 %, three times that allowed.
    expect((mean * mean) / variance / spectrum.effectiveAverages).toBeGreaterThan(0.6);
    expect((mean * mean) / variance / spectrum.effectiveAverages).toBeLessThan(1.6);
  },
);

it('reads silence as no power', () => {
  const spectrum = average(new Float64Array(4096));
  expect(sumOf(spectrum.power)).toBe(0);
  expect(levelSpectrumDbfs(spectrum)[5]).toBe(-Infinity);
});
