import { describe, expect, it } from 'vitest';
import { ratioToDb } from '../level/decibel.js';
import { bendCosine, clipBothHalves, clipPositiveHalf, deadZone } from '../testing/closed-forms.js';
import { lineOf, pass } from './testing/pass.js';
import { bendBySoftClip } from './stages/bend.js';
import type { PracticeStage } from './device.js';

const LENGTH = 65_536;
/** Prime to the length, so that the folds of high harmonics miss the low ones. */
const CYCLES = 1361;
const RATE_HZ = 48_000;
const TONE = Float64Array.from({ length: LENGTH }, (_, n) =>
  Math.cos((2 * Math.PI * ((n * CYCLES) % LENGTH)) / LENGTH),
);

function harmonicsOf(stage: PracticeStage, count: number): number[] {
  const [samples] = pass([TONE], RATE_HZ, [stage]);
  return Array.from({ length: count }, (_, k) => lineOf(samples, (k + 1) * CYCLES));
}

describe('bending stages against their Fourier series', () => {
  // The series are derived from their integrals (closed-forms.ts); these decibels are the table's for level 0.9, 3 decimals.
  it('clips both halves', () => {
    const harmonics = harmonicsOf({ kind: 'clip', channel: 'both', positive: 0.9, negative: 0.9 }, 5);
    const expected = clipBothHalves(0.9, 5).harmonics;
    // Folds of the endless series of harmonics leave 1e-7 on each line.
    harmonics.forEach((amplitude, k) => expect(amplitude).toBeCloseTo(Math.abs(expected[k]), 6));
    expect(ratioToDb(harmonics[2] / harmonics[0])).toBeCloseTo(-29.666, 2);
  });

  it('clips one half, and leaves the other alone', () => {
    const harmonics = harmonicsOf({ kind: 'clip', channel: 'both', positive: 0.9, negative: 10 }, 5);
    const expected = clipPositiveHalf(0.9, 5).harmonics;
    harmonics.forEach((amplitude, k) => expect(amplitude).toBeCloseTo(Math.abs(expected[k]), 6));
    expect(ratioToDb(harmonics[1] / harmonics[0])).toBeCloseTo(-34.938, 2);
  });

  it('opens a dead zone', () => {
    const harmonics = harmonicsOf({ kind: 'dead-zone', channel: 'both', width: 0.01 }, 5);
    const expected = deadZone(0.01, 5).harmonics;
    harmonics.forEach((amplitude, k) => expect(amplitude).toBeCloseTo(Math.abs(expected[k]), 6));
    expect(ratioToDb(harmonics[2] / harmonics[0])).toBeCloseTo(-47.334, 2);
  });

  it('bends by a polynomial', () => {
    const harmonics = harmonicsOf(
      { kind: 'polynomial', channel: 'both', coefficients: [1, 0.01, 0.02, 0.003, 0.004] },
      5,
    );
    const expected = bendCosine(1, [0.01, 0.02, 0.003, 0.004]).harmonics;
    // A polynomial's harmonics end at its degree: nothing folds, rounding alone is left.
    harmonics.forEach((amplitude, k) => expect(amplitude).toBeCloseTo(Math.abs(expected[k]), 12));
  });

  it('clips softly: straight below the knee, within the limit above, hard with no knee', () => {
    const soft = bendBySoftClip(0.8, 0.6, 6);
    const knee = 0.8 * 10 ** (-6 / 20);
    expect(soft(knee)).toBe(knee);
    expect(soft(-0.3)).toBe(-0.3);
    expect(soft(5)).toBeLessThanOrEqual(0.8);
    expect(soft(5)).toBeGreaterThan(0.799);
    expect(soft(-5)).toBeCloseTo(-0.6, 3);
    // One step of slope at the knee would show as a difference of the two one-sided slopes.
    const h = 1e-5;
    expect((soft(knee + h) - soft(knee)) / h).toBeCloseTo(1, 6);
    const hard = bendBySoftClip(0.8, 0.6, 0);
    expect([hard(2), hard(-2), hard(0.5)]).toEqual([0.8, -0.6, 0.5]);
  });
});

describe('filters against the analogue prototypes', () => {
  /** Where the bilinear transform takes a frequency, against the stage's own. */
  const warp = (frequencyHz: number, centreHz: number) =>
    Math.tan((Math.PI * frequencyHz) / RATE_HZ) / Math.tan((Math.PI * centreHz) / RATE_HZ);

  function responseDb(stage: PracticeStage, bin: number): number {
    const impulse = new Float64Array(LENGTH);
    impulse[0] = 1;
    const [samples] = pass([impulse], RATE_HZ, [stage]);
    return ratioToDb((lineOf(samples, bin) * LENGTH) / 2);
  }
  const bins = [30, 400, 1365, 8000, 25_000];
  const frequencyOf = (bin: number) => (bin * RATE_HZ) / LENGTH;

  // Butterworth's magnitude: 1 / sqrt(1 + w^2n). S. Butterworth, Experimental Wireless 7, 1930.
  it.each([1, 2, 3, 4, 7])('passes low frequencies with order %i', (order) => {
    const stage: PracticeStage = {
      kind: 'filter',
      channel: 'both',
      type: 'low-pass',
      frequencyHz: 2000,
      order,
    };
    for (const bin of bins) {
      const expected = -10 * Math.log10(1 + warp(frequencyOf(bin), 2000) ** (2 * order));
      if (expected > -200) expect(responseDb(stage, bin)).toBeCloseTo(expected, 5);
    }
  });

  it.each([1, 2, 5])('passes high frequencies with order %i', (order) => {
    const stage: PracticeStage = {
      kind: 'filter',
      channel: 'both',
      type: 'high-pass',
      frequencyHz: 500,
      order,
    };
    for (const bin of bins) {
      const expected = -10 * Math.log10(1 + warp(frequencyOf(bin), 500) ** (-2 * order));
      if (expected > -150) expect(responseDb(stage, bin)).toBeCloseTo(expected, 5);
    }
  });

  // Analogue prototypes of the audio EQ cookbook (W3C note, 2021): A = 10^(gain/40).
  it('lifts a peak and both shelves', () => {
    const [gainDb, q, centreHz] = [7, 0.9, 1500];
    const a = 10 ** (gainDb / 40);
    const common = { kind: 'filter', channel: 'both', frequencyHz: centreHz, gainDb, q } as const;
    for (const bin of bins) {
      const w = warp(frequencyOf(bin), centreHz);
      const peak = Math.hypot(1 - w * w, (w * a) / q) / Math.hypot(1 - w * w, w / (a * q));
      const root = Math.sqrt(a);
      const low = (a * Math.hypot(a - w * w, (root * w) / q)) / Math.hypot(1 - a * w * w, (root * w) / q);
      const high = (a * Math.hypot(1 - a * w * w, (root * w) / q)) / Math.hypot(a - w * w, (root * w) / q);
      expect(responseDb({ ...common, type: 'peak' }, bin)).toBeCloseTo(ratioToDb(peak), 5);
      expect(responseDb({ ...common, type: 'shelf', side: 'low' }, bin)).toBeCloseTo(ratioToDb(low), 5);
      expect(responseDb({ ...common, type: 'shelf' }, bin)).toBeCloseTo(ratioToDb(high), 5);
    }
  });
});
