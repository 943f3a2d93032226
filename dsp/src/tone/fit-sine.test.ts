import { expect, it } from 'vitest';
import { createRandom } from '../random/create-random.js';
import { mix, quantise, sine, synthesise, whiteNoise } from '../testing/signals.js';
import { createWindow } from '../window/create-window.js';
import { estimateTone, findStrongestTone } from './estimate-tone.js';
import { fitSine } from './fit-sine.js';

const wrap = (rad: number): number => Math.atan2(Math.sin(rad), Math.cos(rad));

/** Estimate, then fit: what a measure does. */
function find(samples: Float64Array, sampleRateHz: number) {
  const estimate = estimateTone(samples, sampleRateHz);
  return fitSine(samples, sampleRateHz, estimate!.frequencyHz);
}

it.each([
  [44_100, 20],
  [48_000, 20.7],
  [48_000, 50.3],
  [48_000, 997.123],
  [96_000, 20.3],
  [96_000, 19_997.7],
  [44_100, 19_845],
  [192_000, 86_400],
  [192_000, 31.7],
])('finds a tone with harmonics and a constant part in 0.25 s: %i Hz rate, %f Hz', (rate, frequencyHz) => {
  const lines = [
    { frequencyHz, amplitude: 0.5, phaseRad: 0.3 },
    { frequencyHz: 2 * frequencyHz, amplitude: 0.5e-3 },
    { frequencyHz: 3 * frequencyHz, amplitude: 0.3e-3, phaseRad: 2 },
  ].filter((line) => line.frequencyHz < rate / 2);
  const fit = find(synthesise(Math.round(rate / 4), rate, lines, 0.02), rate);
  // Five cycles at 20 Hz: harmonics -60 dB down leak at -92 dB through the narrower window, 1e-3 · 3e-5.
  expect(Math.abs(fit.frequencyHz - frequencyHz)).toBeLessThan(1e-6);
  expect(Math.abs(fit.amplitude / 0.5 - 1)).toBeLessThan(1e-7);
  expect(Math.abs(fit.offset - 0.02)).toBeLessThan(1e-7);
  expect(Math.abs(wrap(fit.phaseRad - 0.3))).toBeLessThan(1e-5);
});

it('isn’t pulled by harmonics at -40 and -50 dB', () => {
  const rate = 65_536;
  const samples = synthesise(rate, rate, [
    { frequencyHz: 1361.37, amplitude: 1 },
    { frequencyHz: 2722.74, amplitude: 1e-2, phaseRad: 1 },
    { frequencyHz: 4084.11, amplitude: 3.16e-3, phaseRad: 2 },
  ]);
  const fit = fitSine(samples, rate, 1361);
  // A plain fit is off by 1e-9 and 2e-6 (simulated); the weighted one by rounding.
  expect(Math.abs(fit.frequencyHz / 1361.37 - 1)).toBeLessThan(1e-12);
  expect(Math.abs(fit.amplitude - 1)).toBeLessThan(1e-11);
});

it('reaches the Cramér-Rao bound in white noise but for the weight’s cost', () => {
  const rate = 4096;
  const sigma = 1e-3 / Math.SQRT2;
  const errors = Array.from({ length: 60 }, (_, seed) => {
    const samples = mix(sine(rate, rate, 401.3, 1, seed), whiteNoise(rate, sigma, seed));
    const fit = fitSine(samples, rate, 401);
    return { frequency: ((fit.frequencyHz - 401.3) * 2 * Math.PI) / rate, amplitude: fit.amplitude - 1 };
  });
  const rms = (pick: (e: (typeof errors)[number]) => number): number =>
    Math.sqrt(errors.reduce((sum, e) => sum + pick(e) ** 2, 0) / errors.length);
  // Bounds for equal weights (Rife and Boorstyn, IEEE Trans. IT 20(5), 1974): 1.32e-8 rad per sample and 1.12e-5 for
  // this noise. Weighted squares cost sqrt(Σw²u² · Σu²) / Σwu² in the slope and sqrt(Σw² · N) / Σw in the amplitude.
  const { samples: w } = createWindow('blackman-harris-7', rate);
  let wu2 = 0;
  let w2u2 = 0;
  let u2 = 0;
  w.forEach((weight, n) => {
    const square = (n - (rate - 1) / 2) ** 2;
    u2 += square;
    wu2 += weight * square;
    w2u2 += weight * weight * square;
  });
  const frequencyBound = (Math.sqrt(w2u2 * u2) / wu2) * sigma * Math.sqrt(24 / rate ** 3);
  const amplitudeBound =
    Math.sqrt(createWindow('blackman-harris-7', rate).enbwBins) * sigma * Math.sqrt(2 / rate);
  // Sixty trials know a standard deviation to 9 %; three times that.
  expect(Math.abs(rms((e) => e.frequency) / frequencyBound - 1)).toBeLessThan(0.28);
  expect(Math.abs(rms((e) => e.amplitude) / amplitudeBound - 1)).toBeLessThan(0.28);
});

it('finds its tone from a start two bins off, as a clock 200 ppm off makes it', () => {
  const rate = 48_000;
  const samples = sine(rate * 5, rate, 997 * (1 + 200e-6), 0.25, 1);
  expect(Math.abs(fitSine(samples, rate, 997).frequencyHz / 997 - 1 - 200e-6)).toBeLessThan(1e-11);
});

it('keeps to its tone beside a stronger one', () => {
  const rate = 48_000;
  const samples = synthesise(rate, rate, [
    { frequencyHz: 60, amplitude: 0.8 },
    { frequencyHz: 7001.3, amplitude: 0.2 },
  ]);
  expect(Math.abs(fitSine(samples, rate, 7000).amplitude - 0.2)).toBeLessThan(1e-9);
});

it('reads a tone at -120 dBFS in 24 bits', () => {
  const rate = 48_000;
  const samples = quantise(sine(rate * 4, rate, 997.1, 1e-6), 24, createRandom(4));
  // Noise -141 dBFS: amplitude good to 10^-7 · sqrt(2/192000) · 2, under 0.1 %.
  expect(Math.abs(find(samples, rate).amplitude / 1e-6 - 1)).toBeLessThan(2e-3);
});

it('holds the frequency when told to', () => {
  const samples = sine(4800, 48_000, 1000, 0.5, 0.4);
  const fit = fitSine(samples, 48_000, 1000, { holdFrequency: true });
  expect(fit.frequencyHz).toBeCloseTo(1000, 9);
  expect(fit.iterations).toBe(0);
  expect(fit.amplitude).toBeCloseTo(0.5, 12);
  expect(fit.phaseRad).toBeCloseTo(0.4, 10);
});

it('refuses what can’t be fitted', () => {
  const samples = sine(480, 48_000, 1000, 0.5);
  const refusal = (code: string): unknown => expect.objectContaining({ code });
  expect(() => fitSine(samples, 48_000, 0)).toThrow(refusal('BAD_ARGUMENT'));
  expect(() => fitSine(samples, 48_000, 24_000)).toThrow(refusal('BAD_ARGUMENT'));
  expect(() => fitSine(samples, 48_000, Number.NaN)).toThrow(refusal('BAD_ARGUMENT'));
  expect(() => fitSine(samples, 48_000, 50)).toThrow(refusal('SEGMENT_TOO_SHORT'));
  expect(() => fitSine(new Float64Array(0), 48_000, 50)).toThrow(refusal('SEGMENT_TOO_SHORT'));
  expect(() => fitSine(new Float64Array(4800), 48_000, 1000)).toThrow(refusal('NOTHING_MEASURABLE'));
});

it('estimates nothing in silence, in a constant and in too few samples', () => {
  expect(estimateTone(new Float64Array(4096), 48_000)).toBeNull();
  expect(estimateTone(new Float64Array(4096).fill(0.25), 48_000)).toBeNull();
  expect(estimateTone(sine(63, 48_000, 5000, 1), 48_000)).toBeNull();
});

it('looks for the strongest tone in the band asked for', () => {
  const samples = synthesise(48_000, 48_000, [
    { frequencyHz: 60.2, amplitude: 0.8 },
    { frequencyHz: 7000.4, amplitude: 0.2 },
  ]);
  expect(estimateTone(samples, 48_000)!.frequencyHz).toBeCloseTo(60.2, 2);
  const high = estimateTone(samples, 48_000, { lowHz: 1000, highHz: 10_000 })!;
  expect(high.frequencyHz).toBeCloseTo(7000.4, 4);
  expect(high.power).toBeCloseTo(0.02, 8);
});

it('gives null for a spectrum without power', () => {
  const spectrum = {
    sampleRateHz: 48_000,
    fftLength: 64,
    binWidthHz: 750,
    windowName: 'hann' as const,
    enbwBins: 1.5,
    exclusionHalfWidthBins: 2,
    averages: 1,
    effectiveAverages: 1,
    binCorrelation: 1,
    power: new Float64Array(33),
  };
  expect(findStrongestTone(spectrum)).toBeNull();
});
