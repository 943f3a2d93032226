import { describe, expect, it } from 'vitest';
import { idealSnrDb } from '../level/quantisation.js';
import { createRandom } from '../random/create-random.js';
import { sine, whiteNoise } from '../testing/signals.js';
import { createGridDetector, undoAsymmetricScaling } from './input-grid.js';

const RATE_HZ = 48_000;
const noise = whiteNoise(RATE_HZ, 1e-4, 2);
const wave = sine(RATE_HZ, RATE_HZ, 997, 0.4).map((x, n) => x + noise[n]);
const codes = (bits: number) => wave.map((x) => Math.round(x * 2 ** (bits - 1)));

function read(samples: ArrayLike<number>, block = 128) {
  const detector = createGridDetector();
  const floats = Float32Array.from(samples);
  for (let at = 0; at < floats.length; at += block) detector.push(floats.subarray(at, at + block));
  return detector.read();
}

describe('the grid of an input', () => {
  it('of 16 bits, by either way of dividing the codes', () => {
    expect(read(codes(16).map((code) => code / 32_768))).toMatchObject({ kind: '16-bit', bits: 16 });
    const divided = codes(16).map((code) => (code > 0 ? code / 32_767 : code / 32_768));
    expect(read(divided)).toMatchObject({ kind: '16-bit-asymmetric', bits: 16 });
  });

  it('of 24 bits, and of floats', () => {
    expect(read(codes(24).map((code) => code / 2 ** 23))).toMatchObject({ kind: '24-bit', bits: 24 });
    expect(read(wave)).toMatchObject({ kind: 'float', bits: null, floorDbfs: null });
  });

  it('is not told from silence, or from too few values', () => {
    expect(read(new Float64Array(1000)).kind).toBe('silent');
    expect(read(Float64Array.from({ length: 1000 }, (_, n) => ((n % 5) - 2) / 32_768)).kind).toBe('unknown');
  });

  it('has the noise of an ideal quantiser', () => {
    // idealSnrDb is 6.02 N + 1.76 dB, checked against the published formula beside it.
    const random = createRandom(5);
    for (const bits of [16, 24]) {
      const samples = Float64Array.from(
        { length: 5000 },
        () => Math.round((random() - 0.5) * 2 ** bits) / 2 ** (bits - 1),
      );
      expect(read(samples).floorDbfs).toBeCloseTo(-idealSnrDb(bits, 'none'), 9);
    }
  });

  it('is made even again where positive codes were divided by 32,767', () => {
    const whole = codes(16);
    const samples = Float32Array.from(whole, (code) => (code > 0 ? code / 32_767 : code / 32_768));
    undoAsymmetricScaling(samples);
    expect(samples).toEqual(Float32Array.from(whole, (code) => code / 32_768));
  });
});
