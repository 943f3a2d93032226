import { expect, it } from 'vitest';
import { createRandom } from '../random/create-random.js';
import { quantise, sine, whiteNoise } from '../testing/signals.js';
import { createLevelMeter } from './create-level-meter.js';
import { createTruePeakMeter } from './create-true-peak-meter.js';
import { dbfsToMeanSquare, dbToPower, dbToRatio, meanSquareToDbfs, powerToDb, ratioToDb } from './decibel.js';
import { lsbOf, quantisationNoise } from './quantisation.js';
import { TRUE_PEAK_PHASES } from './true-peak-coefficients.js';

function read(samples: Float64Array, integerBits?: number) {
  const meter = createLevelMeter({ integerBits });
  meter.push(samples);
  return meter.read();
}

it('turns decibels and ratios into each other', () => {
  expect(ratioToDb(10)).toBe(20);
  expect(powerToDb(10)).toBe(10);
  expect(dbToRatio(-20)).toBeCloseTo(0.1, 15);
  expect(dbToPower(-20)).toBeCloseTo(0.01, 15);
  expect(dbToRatio(-Infinity)).toBe(0);
  expect(ratioToDb(0)).toBe(-Infinity);
  expect(meanSquareToDbfs(dbfsToMeanSquare(-37.5))).toBeCloseTo(-37.5, 12);
});

it('reads level, constant part and ends of a stream in any blocks', () => {
  const samples = sine(48_000, 48_000, 997, 0.5).map((value) => value + 0.1);
  const whole = read(samples);
  expect(whole.mean).toBeCloseTo(0.1, 13);
  expect(whole.meanSquare).toBeCloseTo(0.125 + 0.01, 13);
  expect([whole.first, whole.last]).toEqual([samples[0], samples[47_999]]);
  expect([whole.lowest, whole.highest]).toEqual([Math.min(...samples), Math.max(...samples)]);
  expect(whole.samplePeak).toBe(whole.highest);
  const meter = createLevelMeter();
  for (let n = 0; n < samples.length; n += 1000) meter.push(samples.subarray(n, n + 1000));
  meter.push(new Float64Array(0));
  const parts = meter.read();
  expect(parts.meanSquare).toBeCloseTo(whole.meanSquare, 14);
  expect(parts.count).toBe(48_000);
});

it('reads no samples as silence', () => {
  expect(read(new Float64Array(0))).toMatchObject({ count: 0, mean: 0, meanSquare: 0, samplePeak: 0 });
});

it('counts runs of three or more equal end codes, also over the edge of a block', () => {
  const top = 1 - 2 ** -15;
  const meter = createLevelMeter({ integerBits: 16 });
  meter.push(Float64Array.of(0, top, top, 0, -1, -1, -1, top, top));
  meter.push(Float64Array.of(top, top, 0.5, -1));
  // Two tops (no run), three bottoms, four tops, one bottom.
  expect(meter.read()).toMatchObject({ endCodeCount: 10, clippedRunCount: 2, longestEndCodeRun: 4 });
});

it('takes the end codes from the bits: float samples clip at ±1 alone', () => {
  const top = 1 - 2 ** -15;
  const samples = Float64Array.of(top, top, top, 1, 1, 1.5, -1);
  expect(read(samples)).toMatchObject({ endCodeCount: 4, clippedRunCount: 1 });
  expect(read(samples, 16)).toMatchObject({ endCodeCount: 7, clippedRunCount: 1, longestEndCodeRun: 6 });
  expect(read(samples, 24)).toMatchObject({ endCodeCount: 4 });
});

/** All windows, straight from the four phases. */
function plainTruePeak(samples: Float64Array): number {
  const phases = [...TRUE_PEAK_PHASES, ...TRUE_PEAK_PHASES.map((h) => [...h].reverse())];
  let peak = 0;
  for (let n = 0; n < samples.length + 11; n++) {
    peak = Math.max(peak, Math.abs(samples[n] ?? 0));
    for (const h of phases) {
      peak = Math.max(peak, Math.abs(h.reduce((sum, tap, i) => sum + tap * (samples[n - i] ?? 0), 0)));
    }
  }
  return peak;
}

it.each([
  ['a low tone', sine(20_000, 48_000, 97.3, 0.9)],
  ['a tone', sine(20_000, 96_000, 997.3, 0.9)],
  ['a high tone', sine(20_000, 48_000, 19_997, 0.9)],
  ['noise', whiteNoise(20_000, 0.1, 3)],
  ['a step at the end', new Float64Array(9000).fill(1, 8995)],
  ['one sample', Float64Array.of(0.5)],
  ['growing noise', whiteNoise(20_000, 0.1, 4).map((value, n) => (value * n) / 20_000)],
])('skips no window that counts: %s', (_name, samples) => {
  const meter = createTruePeakMeter(48_000);
  for (let n = 0; n < samples.length; n += 777) meter.push(samples.subarray(n, n + 777));
  // Sums in another order: rounding alone.
  expect(Math.abs(meter.read() / plainTruePeak(samples) - 1)).toBeLessThan(1e-12);
});

it('reads silence as 0 and refuses a rate of 0', () => {
  const meter = createTruePeakMeter(44_100);
  meter.push(new Float64Array(10_000));
  expect(meter.read()).toBe(0);
  expect(meter.oversampledRateHz).toBe(176_400);
  expect(() => createTruePeakMeter(0)).toThrow(expect.objectContaining({ code: 'BAD_ARGUMENT' }));
});

// Lipshitz, Wannamaker and Vanderkooy 1992: triangular dither makes the error's power a quarter LSB², whatever the input.
it.each([0, 0.25, 0.5])('models a dithered quantiser: constant input of %f LSB', (lsb) => {
  const input = lsb * lsbOf(16);
  const output = quantise(new Float64Array(1 << 18).fill(input), 16, createRandom(8));
  const error = read(output.map((value) => value - input));
  // 2^18 samples: standard deviation 0.3 % of the power, 0.1 % LSB of the mean; about five of them.
  expect(Math.abs(error.meanSquare / quantisationNoise(16, 'triangular') - 1)).toBeLessThan(0.02);
  expect(Math.abs(error.mean / lsbOf(16))).toBeLessThan(0.005);
});
