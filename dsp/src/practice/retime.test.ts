import { describe, expect, it } from 'vitest';
import { interpolate } from './stages/interpolate.js';
import { ratioToDb } from '../level/decibel.js';
import { synthesise } from '../testing/signals.js';
import { lineOf, pass } from './testing/pass.js';

const LENGTH = 16_384;
const RATE_HZ = 44_100;
/** Frames at the ends that know of the silence beyond: half the kernel and the longest delay here. */
const EDGE = 80;

function tone(frequencyHz: number, phaseRad = 0, length = LENGTH): Float64Array {
  return synthesise(length, RATE_HZ, [{ frequencyHz, amplitude: 0.9, phaseRad }]);
}

/** Greatest difference away from the ends, dB against the tone. */
function errorDb(got: Float64Array, wanted: Float64Array): number {
  let worst = 0;
  for (let n = EDGE; n < got.length - EDGE; n++) worst = Math.max(worst, Math.abs(got[n] - wanted[n]));
  return ratioToDb(worst / 0.9);
}

describe('delay', () => {
  it.each([
    { frequencyHz: 997, samples: 0.37 },
    { frequencyHz: 10_007, samples: 12.5 },
    { frequencyHz: 0.45 * RATE_HZ, samples: -3.113 },
  ])('moves $frequencyHz Hz by $samples frames to -140 dB', ({ frequencyHz, samples }) => {
    const [late] = pass([tone(frequencyHz)], RATE_HZ, [{ kind: 'delay', channel: 'both', samples }]);
    const wanted = tone(frequencyHz, (-2 * Math.PI * frequencyHz * samples) / RATE_HZ);
    expect(errorDb(late, wanted)).toBeLessThan(-140);
  });

  it('moves by whole frames without changing a sample, on one channel alone', () => {
    const samples = tone(997);
    const [left, right] = pass([samples, samples], RATE_HZ, [
      { kind: 'delay', channel: 'right', samples: 5 },
    ]);
    expect(left).toEqual(samples);
    expect(right.subarray(5)).toEqual(samples.subarray(0, LENGTH - 5));
    expect([...right.subarray(0, 5)]).toEqual([0, 0, 0, 0, 0]);
  });
});

it('a delay too small for its rounding is no delay', () => {
  const frames = Float64Array.of(0.1, -0.2, 0.3, 0.4);
  const [moved] = interpolate([frames], 4, (frame) => frame - Number.MIN_VALUE);
  expect([...moved]).toEqual([...frames]);
});

describe('clock', () => {
  it.each([200, -200, 17.3])('plays %d ppm fast to -140 dB', (ppm) => {
    const speed = 1 + ppm * 1e-6;
    const [fast] = pass([tone(15_013)], RATE_HZ, [{ kind: 'clock', channel: 'both', ppm }]);
    expect(fast.length).toBe(Math.round(LENGTH / speed));
    expect(errorDb(fast, tone(15_013 * speed, 0, fast.length))).toBeLessThan(-140);
  });
});

describe('clock and lead', () => {
  it("keeps the signal's first frame where the lead puts it", () => {
    const samples = tone(1000);
    const [fast] = pass([samples], RATE_HZ, [
      { kind: 'clock', channel: 'both', ppm: 150 },
      { kind: 'lead', channel: 'both', seconds: 0.1 },
    ]);
    const signal = fast.subarray(4410, fast.length - 4410);
    expect(errorDb(signal, tone(1000 * (1 + 150e-6), 0, signal.length))).toBeLessThan(-140);
  });
});

describe('jitter', () => {
  // Phase modulation: each sideband stands pi f0 J below the tone (1 ns peak on 11,025 Hz: -89.2094 dB); the exact
  // ratio is J1/J0 of 2 pi f0 J, equal to 1e-8 here. Derivation: sin(a + b sin c) for small b.
  it('makes a pair of sidebands of the size that the rule gives', () => {
    const length = 19_200; // 100 periods of rate/192 on both sides of rate/4
    const samples = synthesise(length, RATE_HZ, [{ frequencyHz: RATE_HZ / 4, amplitude: 0.9 }]);
    // Whole periods: silence at the ends is kept out by taking a middle stretch of whole periods.
    const [shaken] = pass([samples], RATE_HZ, [
      { kind: 'jitter', channel: 'both', peakToPeakPs: 2000, frequencyHz: RATE_HZ / 192 },
    ]);
    const middle = shaken.subarray(192, length - 192);
    const carrier = middle.length / 4;
    const offset = middle.length / 192;
    const level = lineOf(middle, carrier);
    expect(ratioToDb(lineOf(middle, carrier - offset) / level)).toBeCloseTo(-89.2094, 3);
    expect(ratioToDb(lineOf(middle, carrier + offset) / level)).toBeCloseTo(-89.2094, 3);
  });

  // SNR = -20 lg(2 pi f0 sigma): 83.189 dB for 1 ns RMS on 11,025 Hz (power of the first-order term of the same sine).
  it('makes noise of the size that the rule gives when random, alike on both channels', () => {
    const samples = tone(11_025, 0, 1 << 17);
    const [left, right] = pass([samples, samples], RATE_HZ, [
      { kind: 'jitter', channel: 'both', rmsPs: 1000 },
    ]);
    expect(right).toEqual(left);
    let noise = 0;
    let signal = 0;
    for (let n = EDGE; n < samples.length - EDGE; n++) {
      noise += (left[n] - samples[n]) ** 2;
      signal += samples[n] ** 2;
    }
    // 131,072 values: the estimate's standard deviation is about 0.03 dB.
    expect(Math.abs(10 * Math.log10(signal / noise) - 83.189)).toBeLessThan(0.15);
  });
});
