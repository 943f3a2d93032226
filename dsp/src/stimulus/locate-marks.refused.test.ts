import { describe, expect, it } from 'vitest';
import { createRandom } from '../random/create-random.js';
import { openMemorySource } from '../source/open-memory-source.js';
import { createGaussian, sine, synthesise, whiteNoise } from '../testing/signals.js';
import { createStimulus } from './create-stimulus.js';
import { locateMarks } from './locate-marks.js';
import { markAt } from './mark-chirp.js';

const RATE_HZ = 44_100;
const LENGTH = 12 * RATE_HZ;

const locate = (samples: Float64Array) => locateMarks(openMemorySource([samples], RATE_HZ));

/** Notes of a random scale, struck and dying away, a few at a time, over noise that falls with frequency. */
function musicLike(seed: number): Float64Array {
  const random = createRandom(seed);
  const gaussian = createGaussian(random);
  let brown = 0;
  const samples = Float64Array.from({ length: LENGTH }, () => (brown = 0.995 * brown + 0.002 * gaussian()));
  for (let note = 0; note < 100; note++) {
    const from = Math.floor(random() * LENGTH);
    const frequencyHz = 110 * 2 ** (random() * 6);
    const dieS = 0.02 + 0.4 * random();
    const glideHz = (random() - 0.5) * 2000;
    for (let n = 0; n < RATE_HZ && from + n < LENGTH; n++) {
      const t = n / RATE_HZ;
      samples[from + n] +=
        0.2 * Math.exp(-t / dieS) * Math.sin(2 * Math.PI * (frequencyHz + glideHz * t) * t);
    }
  }
  return samples;
}

/** Noise of one narrow band: it looks like any other short signal of that band more often than white noise does. */
function bandNoise(frequencyHz: number, widthHz: number, seed: number): Float64Array {
  const samples = whiteNoise(LENGTH, 1, seed);
  const radius = Math.exp((-Math.PI * widthHz) / RATE_HZ);
  const turn = 2 * radius * Math.cos((2 * Math.PI * frequencyHz) / RATE_HZ);
  let one = 0;
  let two = 0;
  return samples.map((x) => {
    const y = x + turn * one - radius * radius * two;
    two = one;
    one = y;
    return 0.01 * y;
  });
}

function marksAt(timesS: readonly number[]): Float64Array {
  return Float64Array.from({ length: LENGTH }, (_, n) =>
    timesS.reduce((sum, atS) => sum + 0.1 * markAt(n / RATE_HZ - atS), 0),
  );
}

describe('what holds no pair of marks', () => {
  it.each([1, 2, 3])('music-like signals (%i)', async (seed) => {
    expect(await locate(musicLike(seed))).toBeNull();
  });

  it.each([1, 2, 3])('white noise (%i)', async (seed) => {
    expect(await locate(whiteNoise(LENGTH, 0.2, seed))).toBeNull();
  });

  it.each([
    [2500, 300],
    [3000, 800],
    [4000, 2000],
  ])('noise round %i Hz, %i Hz wide', async (frequencyHz, widthHz) => {
    expect(await locate(bandNoise(frequencyHz, widthHz, 5))).toBeNull();
  });

  it.each([50, 997, 2000, 4000, 6000, 20_000])('a tone of %i Hz', async (frequencyHz) => {
    expect(await locate(sine(LENGTH, RATE_HZ, frequencyHz, 0.9))).toBeNull();
  });

  it('beating tones that repeat every 0.31 s', async () => {
    const partials = Array.from({ length: 40 }, (_, k) => ({
      frequencyHz: (620 + k) / 0.31,
      amplitude: 0.02,
    }));
    expect(await locate(synthesise(LENGTH, RATE_HZ, partials))).toBeNull();
  });

  it('an exponential sweep', async () => {
    const perOctaveS = 12 / Math.log2(1000);
    const sweep = Float64Array.from(
      { length: LENGTH },
      (_, n) =>
        0.5 * Math.sin(2 * Math.PI * 20 * (perOctaveS / Math.LN2) * (2 ** (n / RATE_HZ / perOctaveS) - 1)),
    );
    expect(await locate(sweep)).toBeNull();
  });

  it('digital silence, a constant, and silence with dither', async () => {
    expect(await locate(new Float64Array(LENGTH))).toBeNull();
    expect(await locate(new Float64Array(LENGTH).fill(0.25))).toBeNull();
    expect(await locate(whiteNoise(LENGTH, 2 ** -16, 9))).toBeNull();
  });

  it.each([0, 1, 100, 3000])('a recording of %i frames', async (length) => {
    expect(await locate(whiteNoise(length, 0.1, 4))).toBeNull();
  });

  it('one mark alone, and marks whose gap the table lacks', async () => {
    expect(await locate(marksAt([3]))).toBeNull();
    expect(await locate(marksAt([3, 3.9]))).toBeNull();
    expect(await locate(marksAt([3, 3.315]))).toBeNull();
    expect(await locate(marksAt([3, 3.31]))).toMatchObject({ code: 1 });
  });

  it('two marks of opposite polarity', async () => {
    const samples = marksAt([3]).map((x, n) => x - 0.1 * markAt(n / RATE_HZ - 3.31));
    expect(await locate(samples)).toBeNull();
  });

  it('a bare stimulus', async () => {
    const { source } = createStimulus('sine', { sampleRateHz: RATE_HZ, bitsPerSample: 24, isBare: true });
    expect(await locateMarks(source)).toBeNull();
  });
});
