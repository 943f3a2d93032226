import { describe, expect, it } from 'vitest';
import { fitSine, ratioToDb } from '@benchlark/dsp';
import { ToneSource } from './tone-source';

const RATE_HZ = 48_000;

function run(source: ToneSource, frames: number): { left: Float64Array; right: Float64Array } {
  const left = new Float64Array(frames);
  const right = new Float64Array(frames);
  const [l, r] = [new Float32Array(128), new Float32Array(128)];
  for (let at = 0; at + 128 <= frames; at += 128) {
    source.fill(l, r);
    left.set(l, at);
    right.set(r, at);
  }
  return { left, right };
}

const peakOf = (samples: Float64Array): number => samples.reduce((top, x) => Math.max(top, Math.abs(x)), 0);

describe('a steady tone', () => {
  it('has the level that was asked for, as a sine fitted to it tells (IEEE Std 1057, four parameters)', () => {
    const source = new ToneSource(RATE_HZ);
    source.set({
      tones: [{ frequencyHz: 997, peak: 0.1 }],
      channels: 'both',
      rampS: 0.1,
      riseFromPeak: 0.01,
    });
    run(source, RATE_HZ / 2);
    const { left, right } = run(source, RATE_HZ);
    const fit = fitSine(left, RATE_HZ, 997);
    expect(ratioToDb(fit.amplitude / 0.1)).toBeCloseTo(0, 4);
    expect(fit.frequencyHz).toBeCloseTo(997, 5);
    expect(right).toEqual(left);
  });

  it('rises from its quiet beginning evenly in decibels', () => {
    const source = new ToneSource(RATE_HZ);
    source.set({ tones: [{ frequencyHz: 1000, peak: 1 }], channels: 'both', rampS: 2, riseFromPeak: 0.01 });
    const { left } = run(source, 2 * RATE_HZ);
    const halfway = peakOf(left.subarray(RATE_HZ - 96, RATE_HZ + 96));
    expect(ratioToDb(peakOf(left.subarray(0, 96)))).toBeLessThan(-39);
    expect(ratioToDb(halfway)).toBeCloseTo(-20, 0);
    expect(ratioToDb(peakOf(left.subarray(-96)))).toBeCloseTo(0, 1);
  });

  it('changes and ends without a step: the second difference stays that of a sine', () => {
    const source = new ToneSource(RATE_HZ);
    const ask = (peak: number) =>
      source.set({ tones: [{ frequencyHz: 1000, peak }], channels: 'both', rampS: 0.02, riseFromPeak: 0.01 });
    ask(0.5);
    const first = run(source, 9600).left;
    ask(0.25);
    const second = run(source, 9600).left;
    source.stop();
    const third = run(source, 9600).left;
    const whole = [...first, ...second, ...third];
    const most = whole.slice(2).reduce((top, x, n) => {
      const bend = Math.abs(x - 2 * (whole[n + 1] ?? 0) + (whole[n] ?? 0));
      return Math.max(top, bend);
    }, 0);
    // (2π 1000 / 48000)² × 0.5, and a little for the ramp.
    expect(most).toBeLessThan(0.5 * (2 * Math.PI * (1000 / RATE_HZ)) ** 2 * 1.05);
    expect(source.isSounding).toBe(false);
    expect(peakOf(Float64Array.from(third.subarray(-128)))).toBe(0);
  });

  it.each(['left', 'right'] as const)('plays to the %s alone', (channels) => {
    const source = new ToneSource(RATE_HZ);
    source.set({ tones: [{ frequencyHz: 997, peak: 0.5 }], channels, rampS: 0.02, riseFromPeak: 0.01 });
    const { left, right } = run(source, 9600);
    const [heard, silent] = channels === 'left' ? [left, right] : [right, left];
    expect(peakOf(heard)).toBeGreaterThan(0.4);
    expect(peakOf(silent)).toBe(0);
  });

  it('sums a pair, and lets a tone that is given up fade while the other goes on', () => {
    const source = new ToneSource(RATE_HZ);
    const ask = (tones: { frequencyHz: number; peak: number }[]) =>
      source.set({ tones, channels: 'both', rampS: 0.02, riseFromPeak: 0.01 });
    ask([
      { frequencyHz: 60, peak: 0.4 },
      { frequencyHz: 7000, peak: 0.1 },
    ]);
    expect(peakOf(run(source, RATE_HZ).left)).toBeCloseTo(0.5, 2);
    ask([{ frequencyHz: 60, peak: 0.4 }]);
    run(source, 9600);
    expect(peakOf(run(source, RATE_HZ).left)).toBeCloseTo(0.4, 3);
  });
});
