import { expect, it } from 'vitest';
import { whiteNoise } from '../testing/signals.js';
import { createRealFft } from './create-real-fft.js';

function transform(samples: Float64Array) {
  const re = new Float64Array(samples.length / 2 + 1);
  const im = new Float64Array(samples.length / 2 + 1);
  createRealFft(samples.length).transform(samples, re, im);
  return { re, im };
}

/** One bin by its definition, with the phase reduced exactly and the sum compensated (Kahan). */
function directBin(samples: Float64Array, k: number): [number, number] {
  const length = samples.length;
  const sums = [0, 0];
  const lost = [0, 0];
  for (let n = 0; n < length; n++) {
    const angle = (2 * Math.PI * ((n * k) % length)) / length;
    [samples[n] * Math.cos(angle), -samples[n] * Math.sin(angle)].forEach((term, part) => {
      const value = term - lost[part];
      const sum = sums[part] + value;
      lost[part] = sum - sums[part] - value;
      sums[part] = sum;
    });
  }
  return [sums[0], sums[1]];
}

function relativeError(samples: Float64Array, bins: readonly number[]): number {
  const { re, im } = transform(samples);
  let error = 0;
  for (const k of bins) {
    const [directRe, directIm] = directBin(samples, k);
    error += (re[k] - directRe) ** 2 + (im[k] - directIm) ** 2;
  }
  // Expected power of one bin of unit white noise is N.
  return Math.sqrt(error / bins.length / samples.length);
}

it.each([2, 4, 8, 16, 32, 64, 128, 256, 512, 1024, 2048])(
  'agrees with the direct sum at every bin, N = %i',
  (length) => {
    const bins = Array.from({ length: length / 2 + 1 }, (_, k) => k);
    // Rounding of a double grows with the square root of log N: 1e-15 rms is four units in the last place.
    expect(relativeError(whiteNoise(length, 1, length), bins)).toBeLessThan(1e-15);
  },
);

it.each([4096, 16_384, 32_768, 65_536, 131_072, 262_144, 1_048_576])(
  'agrees with the direct sum, N = %i',
  (length) => {
    const bins = [
      0,
      1,
      2,
      3,
      length / 8 + 3,
      length / 4 - 1,
      length / 4,
      Math.round(length / 3),
      length / 2 - 1,
      length / 2,
    ];
    expect(relativeError(whiteNoise(length, 1, 7), bins)).toBeLessThan(1e-15);
  },
);

it.each([1024, 65_536, 524_288])('keeps the energy (Parseval), N = %i', (length) => {
  const samples = whiteNoise(length, 1, 3);
  const { re, im } = transform(samples);
  let time = 0;
  samples.forEach((value) => (time += value * value));
  let bins = re[0] ** 2 + re[length / 2] ** 2;
  for (let k = 1; k < length / 2; k++) bins += 2 * (re[k] ** 2 + im[k] ** 2);
  expect(bins / length / time - 1).toBeCloseTo(0, 12);
});

it.each([4096, 131_072])('leaves nothing beside an on-bin tone above -300 dB, N = %i', (length) => {
  const samples = Float64Array.from({ length }, (_, n) =>
    Math.sin((2 * Math.PI * ((n * 301) % length)) / length),
  );
  const { re, im } = transform(samples);
  let rest = 0;
  for (let k = 0; k <= length / 2; k++) if (k !== 301) rest += re[k] ** 2 + im[k] ** 2;
  // The samples' own rounding is 1e-16 of full scale a sample: -313 dB spread over all bins.
  expect(10 * Math.log10(rest / (re[301] ** 2 + im[301] ** 2))).toBeLessThan(-300);
});

it('gives the same again: the plan keeps nothing of the last transform', () => {
  const fft = createRealFft(65_536);
  const first = whiteNoise(65_536, 1, 1);
  const out = Array.from({ length: 4 }, () => new Float64Array(32_769));
  fft.transform(first, out[0], out[1]);
  fft.transform(whiteNoise(65_536, 1, 2), out[2], out[3]);
  fft.transform(first, out[2], out[3]);
  expect(out[2]).toEqual(out[0]);
  expect(out[3]).toEqual(out[1]);
  expect(first).toEqual(whiteNoise(65_536, 1, 1));
});

it.each([0, 1, 3, 1000, -8, 2.5, Number.NaN, Infinity])('refuses a length of %s', (length) => {
  expect(() => createRealFft(length)).toThrow(expect.objectContaining({ code: 'BAD_ARGUMENT' }));
});

it('refuses arrays of another length', () => {
  const fft = createRealFft(8);
  const bins = new Float64Array(5);
  expect(() => fft.transform(new Float64Array(7), bins, bins)).toThrow(/8 samples/);
  expect(() => fft.transform(new Float64Array(8), new Float64Array(4), bins)).toThrow(/5 bins/);
});
