import { describe, expect, it } from 'vitest';
import { meanSquareToDbfs, ratioToDb } from '../level/decibel.js';
import { sine, synthesise } from '../testing/signals.js';
import vectors from '../../../test-vectors/quantisation/quantisation.json' with { type: 'json' };
import { lineOf, pass } from './testing/pass.js';

const LENGTH = 1 << 17;
const RATE_HZ = 48_000;

function meanSquare(samples: Float64Array): number {
  return samples.reduce((sum, sample) => sum + sample * sample, 0) / samples.length;
}

describe('quantise', () => {
  // Ideal quantiser: 6.02 N + 1.76 dB, 4.77 dB less with TPDF dither (source in the table's file).
  it.each(vectors.rows.filter(({ bits }) => bits <= 24))('has the noise of $bits bits', (row) => {
    const peak = 1 - 3 * 2 ** (1 - row.bits);
    const samples = sine(LENGTH, RATE_HZ, 997.13, peak);
    for (const { dither, wantedDb } of [
      { dither: 'none', wantedDb: row.snrUnditheredDb },
      { dither: 'tpdf', wantedDb: row.snrTpdfDb },
    ] as const) {
      const [rounded] = pass([samples], RATE_HZ, [
        { kind: 'quantise', channel: 'both', bits: row.bits, dither },
      ]);
      const errorDbfs = meanSquareToDbfs(meanSquare(rounded.map((sample, n) => sample - samples[n])));
      // 5 standard deviations of the estimator are 0.09 dB; at 8 bits a sine isn't quite busy.
      expect(Math.abs(-errorDbfs - wantedDb)).toBeLessThan(row.bits === 8 ? 0.3 : 0.1);
    }
  });

  it('holds samples to the codes there are', () => {
    const stage = { kind: 'quantise', channel: 'both', bits: 16, dither: 'none' } as const;
    expect([...pass([Float64Array.of(2, -2, 0.5)], RATE_HZ, [stage])[0]]).toEqual([1 - 2 ** -15, -1, 0.5]);
  });
});

describe('noise, hum, tone and modulation', () => {
  const silence = () => [new Float64Array(LENGTH), new Float64Array(LENGTH)];

  it('adds noise of its level, its own on each channel, the same every time', () => {
    const stage = { kind: 'noise', channel: 'both', levelDbfs: -60 } as const;
    const [left, right] = pass(silence(), RATE_HZ, [stage], 7);
    // 131,072 Gaussian values: standard deviation 0.017 dB.
    expect(Math.abs(meanSquareToDbfs(meanSquare(left)) + 60)).toBeLessThan(0.1);
    const shared = left.reduce((sum, sample, n) => sum + sample * right[n], 0) / LENGTH;
    expect(Math.abs(shared / meanSquare(left))).toBeLessThan(0.015); // 5 / sqrt(131,072)
    expect(pass(silence(), RATE_HZ, [stage], 7)[0]).toEqual(left);
    expect(pass(silence(), RATE_HZ, [stage], 8)[0]).not.toEqual(left);
  });

  it('adds multiples of the mains on the channel named alone', () => {
    const frames = 48_000;
    const [left, right] = pass([new Float64Array(frames), new Float64Array(frames)], RATE_HZ, [
      { kind: 'hum', channel: 'right', frequencyHz: 50, levelsDbfs: [-70, -80, -75] },
      { kind: 'tone', channel: 'right', frequencyHz: 1000, levelDbfs: -90 },
    ]);
    expect(meanSquare(left)).toBe(0);
    expect(ratioToDb(lineOf(right, 50))).toBeCloseTo(-70, 6);
    expect(ratioToDb(lineOf(right, 100))).toBeCloseTo(-80, 6);
    expect(ratioToDb(lineOf(right, 150))).toBeCloseTo(-75, 6);
    expect(ratioToDb(lineOf(right, 1000))).toBeCloseTo(-90, 6);
  });

  it('modulates: each sideband 6.02 dB below the depth', () => {
    const [samples] = pass([sine(48_000, RATE_HZ, 1000, 0.5)], RATE_HZ, [
      { kind: 'amplitude-modulation', channel: 'both', depthDb: -40, frequencyHz: 70 },
    ]);
    const carrier = lineOf(samples, 1000);
    // (1 + m sin b) sin a: sidebands of m/2.
    expect(ratioToDb(lineOf(samples, 930) / carrier)).toBeCloseTo(-46.0206, 4);
    expect(ratioToDb(lineOf(samples, 1070) / carrier)).toBeCloseTo(-46.0206, 4);
  });
});

describe('crosstalk', () => {
  it.each([0, 6.0206, -6.0206, 3])('rises by %d dB an octave, without phase', (slopeDbPerOctave) => {
    const partials = [50, 1000, 8000, 20_000].map((frequencyHz) => ({ frequencyHz, amplitude: 0.2 }));
    const frames = 96_000;
    const left = synthesise(frames, RATE_HZ, partials);
    const [same, right] = pass([left, new Float64Array(frames)], RATE_HZ, [
      { kind: 'crosstalk', channel: 'right', levelDb: -60, slopeDbPerOctave },
    ]);
    expect(same).toEqual(left);
    const middle = right.subarray(24_000, 72_000);
    for (const { frequencyHz } of partials) {
      const wantedDb = -60 + slopeDbPerOctave * Math.log2(frequencyHz / 1000);
      expect(Math.abs(ratioToDb(lineOf(middle, frequencyHz) / 0.2) - wantedDb)).toBeLessThan(0.05);
    }
  });

  it('leaks both ways out of what came in', () => {
    const [left, right] = pass([Float64Array.of(1, 0), Float64Array.of(0, 1)], RATE_HZ, [
      { kind: 'crosstalk', channel: 'both', levelDb: -20, slopeDbPerOctave: 0 },
    ]);
    expect([...left, ...right]).toEqual([1, 0.1, 0.1, 1]);
  });
});
