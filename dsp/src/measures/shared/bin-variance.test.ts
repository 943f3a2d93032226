import { describe, expect, it } from 'vitest';
import { createRandom } from '../../random/create-random.js';
import { binVariances } from './bin-variance.js';

const LENGTH = 4096;

/** Power of one bin: a line's amplitude plus a complex normal value, squared; exact for a bin of a transform. */
function drawBin(random: () => number, lineAmplitude: number): number {
  const radius = Math.sqrt(-Math.log(1 - random()));
  const angle = 2 * Math.PI * random();
  return (lineAmplitude + radius * Math.cos(angle)) ** 2 + (radius * Math.sin(angle)) ** 2;
}

/** Mean of many spectra, and the variance that one of them had at a bin. */
function averageSpectra(lineAt: number, lineAmplitude: number): { mean: Float64Array; variance: number } {
  const random = createRandom(5);
  const rounds = 400;
  const mean = new Float64Array(LENGTH);
  const atLine: number[] = [];
  for (let round = 0; round < rounds; round++) {
    for (let k = 0; k < LENGTH; k++) {
      const value = drawBin(random, k === lineAt ? lineAmplitude : 0);
      mean[k] += value / rounds;
      if (k === lineAt) atLine.push(value);
    }
  }
  const middle = atLine.reduce((sum, value) => sum + value, 0) / rounds;
  return { mean, variance: atLine.reduce((sum, value) => sum + (value - middle) ** 2, 0) / (rounds - 1) };
}

describe('binVariances', () => {
  it('gives a steady line the scatter that simulated spectra have, N² + 2 S N', () => {
    const { mean, variance } = averageSpectra(1000, 30);
    const told = binVariances(mean)[1000];
    // The variance of a variance estimated from 400 values is known to 7 % (one standard deviation); three of them.
    expect(told / variance).toBeGreaterThan(0.79);
    expect(told / variance).toBeLessThan(1.21);
    // Noise of that power would scatter by its square, 900 times as much.
    expect(told).toBeLessThan(mean[1000] ** 2 / 100);
  });

  it('leaves noise the scatter of noise: its mean squared', () => {
    const { mean } = averageSpectra(0, 0);
    const total = binVariances(mean).reduce((sum, value) => sum + value, 0);
    // Half of the bins lie above the median of 400 averages and count a little less than their own square.
    expect(total / LENGTH).toBeCloseTo(1, 1);
  });

  it('is zero for silence, and for no bins at all', () => {
    expect([...binVariances(new Float64Array(70))].every((value) => value === 0)).toBe(true);
    expect(binVariances(new Float64Array(0))).toHaveLength(0);
  });
});
