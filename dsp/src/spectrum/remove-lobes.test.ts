import { expect, it } from 'vitest';
import { powerToDb } from '../level/decibel.js';
import { mix, synthesise, whiteNoise, type Partial as Line } from '../testing/signals.js';
import { createSpectrumAverager } from './create-spectrum-averager.js';
import { bandBins, sumBand } from './integrate-band.js';
import { medianOverMean } from './local-density.js';
import { removeLobes } from './remove-lobes.js';

const RATE = 48_000;

function spectrumOf(
  lines: readonly Line[],
  noiseRms: number,
  length = 1 << 17,
  fftLength = 32_768,
  offset = 0,
) {
  const averager = createSpectrumAverager({
    sampleRateHz: RATE,
    fftLength,
    windowName: 'blackman-harris-7',
    overlap: 0.75,
  });
  averager.push(mix(synthesise(length, RATE, lines, offset), whiteNoise(length, noiseRms, 21)));
  return averager.finish();
}

const line = (frequencyHz: number, amplitude: number): Line => ({ frequencyHz, amplitude });

it('counts a bin of a band when its centre is inside, edges included', () => {
  const spectrum = { binWidthHz: 10, power: Float64Array.from({ length: 101 }, () => 1) };
  expect(bandBins(spectrum, 20, 40)).toEqual({ first: 2, last: 4 });
  expect(bandBins(spectrum, 20.1, 39.9)).toEqual({ first: 3, last: 3 });
  expect(bandBins(spectrum, 0, 1e9)).toEqual({ first: 0, last: 100 });
  expect(sumBand(spectrum, 31, 39)).toBe(0);
  expect(sumBand(spectrum, 20, 40)).toBe(3);
  expect(sumBand(spectrum, 20, 40, { weights: spectrum.power.map((_, k) => k) })).toBe(9);
  // 0.1 · 3 isn't 0.3 in binary: the bin at the edge still counts.
  expect(bandBins({ binWidthHz: 0.1, power: new Float64Array(10) }, 0.3, 0.3)).toEqual({ first: 3, last: 3 });
});

it('separates a tone from the noise under it', () => {
  const spectrum = spectrumOf([line(997.3, 0.1)], 1e-3);
  const { power, lobes } = removeLobes(spectrum, [997.3]);
  // A tone in noise: 8.69/sqrt(2 SNR N_eff) dB is 0.001 dB here, five of them.
  expect(powerToDb(lobes[0].power / 0.005)).toBeCloseTo(0, 2);
  // Noise of 1e-6 FS² over 24 kHz; 2^17 samples: standard deviation 0.02 dB.
  expect(
    Math.abs(powerToDb(sumBand(spectrum, 20, 20_000, { power }) / (1e-6 * (19_980 / 24_000)))),
  ).toBeLessThan(0.08);
  expect(Math.abs(powerToDb(lobes[0].noisePerBin / (1e-6 / 16_384)))).toBeLessThan(1);
});

it('keeps a harmonic 120 dB down apart from noise', () => {
  const spectrum = spectrumOf([line(997.3, 0.9), line(1994.6, 0.9e-6)], 1e-7);
  const [fundamental, second, third] = removeLobes(spectrum, [997.3, 1994.6, 2991.9]).lobes;
  expect(powerToDb(second.power / fundamental.power)).toBeCloseTo(-120, 1);
  expect(second.power).toBeGreaterThan(10 * second.standardDeviation);
  // Nothing is there: within four standard deviations of 0.
  expect(Math.abs(third.power)).toBeLessThan(4 * third.standardDeviation);
});

it('has the standard deviation that it states, over many lobes of mere noise', () => {
  const spectrum = spectrumOf([], 1e-3, 1 << 18, 16_384);
  const frequencies = Array.from({ length: 180 }, (_, i) => 500 + i * 120);
  const scores = frequencies.map((f) => {
    const [lobe] = removeLobes(spectrum, [f]).lobes;
    return lobe.power / lobe.standardDeviation;
  });
  const mean = scores.reduce((sum, z) => sum + z, 0) / scores.length;
  const spread = Math.sqrt(scores.reduce((sum, z) => sum + (z - mean) ** 2, 0) / scores.length);
  // 180 lobes: the mean is good to 0.08, the spread to 5 %; neighbourhoods overlap, hence three to four times that.
  expect(Math.abs(mean)).toBeLessThan(0.3);
  expect(spread).toBeGreaterThan(0.8);
  expect(spread).toBeLessThan(1.25);
});

it("isn't misled by hum and a spur beside a low tone", () => {
  const lines = [line(50, 1e-2), line(100, 3e-3), line(150, 1e-3), line(75.4, 0.1), line(180, 1e-2)];
  const [tone] = removeLobes(spectrumOf(lines, 1e-4, 1 << 18, 65_536), [75.4]).lobes;
  // Noise of 1e-8 FS² over 32,768 bins: the density is the noise's, not the lines'.
  expect(Math.abs(powerToDb(tone.noisePerBin / (1e-8 / 32_768)))).toBeLessThan(2);
  expect(powerToDb(tone.power / 0.005)).toBeCloseTo(0, 3);
});

it('takes out and refills a large constant part', () => {
  const spectrum = spectrumOf([line(40, 0.01)], 1e-5, 1 << 16, 16_384, 0.5);
  const { power, constant, lobes } = removeLobes(spectrum, [40]);
  expect(constant.power).toBeCloseTo(0.25, 6);
  expect(powerToDb(lobes[0].power / 5e-5)).toBeCloseTo(0, 3);
  // All that is left is noise of 1e-10 FS²; a tenth of a decibel for 2^16 samples and the refilled bins.
  expect(Math.abs(powerToDb(sumBand(spectrum, 0, 24_000, { power }) / 1e-10))).toBeLessThan(0.2);
});

it('shares the bins of lobes that meet, each bin once', () => {
  const spectrum = spectrumOf([line(1000, 0.1), line(1009, 0.1)], 1e-5, 1 << 16, 32_768);
  const { power, lobes } = removeLobes(spectrum, [1000, 1009]);
  expect(lobes[0].bins + lobes[1].bins).toBeLessThan(30);
  expect(powerToDb((lobes[0].power + lobes[1].power) / 0.01)).toBeCloseTo(0, 2);
  expect(sumBand(spectrum, 900, 1100, { power })).toBeLessThan(1e-11);
});

it('works at both ends of the spectrum and beyond', () => {
  const spectrum = spectrumOf([line(23_990, 0.1)], 1e-5, 1 << 16, 32_768);
  const { lobes, power } = removeLobes(spectrum, [23_990, 24_000, 30_000, 1]);
  expect(powerToDb(lobes[0].power / 0.005)).toBeCloseTo(0, 2);
  expect(lobes[1].bins).toBe(0);
  expect(lobes[2]).toEqual({ frequencyHz: 30_000, power: 0, noisePerBin: 0, bins: 0, standardDeviation: 0 });
  expect(lobes[3].bins).toBeGreaterThan(0);
  expect(power.every(Number.isFinite)).toBe(true);
});

it('finds nothing in silence', () => {
  const spectrum = spectrumOf([], 0, 8192, 4096);
  const { lobes, power } = removeLobes(spectrum, [1000]);
  expect(lobes[0].power).toBe(0);
  expect(power.every((value) => value === 0)).toBe(true);
});

// Medians of averaged periodograms: chi-square quantiles, test-vectors/spectrum.
it.each([
  [1, -1.59174538954861],
  [2, -0.761482416321915],
  [4, -0.371501339750941],
  [16, -0.0910837271493427],
])('knows the median of %i averages against the mean', (averages, expectedDb) => {
  // The series is good to 0.003 dB at one average, better beyond.
  expect(Math.abs(powerToDb(medianOverMean(averages)) - expectedDb)).toBeLessThan(0.004);
});
