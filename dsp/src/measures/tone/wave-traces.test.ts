import { describe, expect, it } from 'vitest';
import { createRandom } from '../../random/create-random.js';
import type { Trace } from '../../record/record.js';
import { clipPositiveHalf } from '../../testing/closed-forms.js';
import { clip, mix, quantise, sine, synthesise, whiteNoise } from '../../testing/signals.js';
import { analyseSamples } from '../testing/analyse-samples.js';
import { toneMeasure } from './tone-measure.js';

const residualOf = async (samples: Float64Array, rate: number): Promise<Trace> =>
  (await analyseSamples(toneMeasure, [samples], rate)).channels[0].traces['residual'];

/** One-sided clip of a unit sine at +level, its harmonics up to `count` (section 15's closed form, turned to sine phase). */
function clippedPartials(
  level: number,
  count: number,
): { order: number; amplitude: number; phaseRad: number }[] {
  // cos n(φ - 90°) as a sine: phase 90° - n·90°.
  return clipPositiveHalf(level, count).harmonics.map((amplitude, index) => {
    const order = index + 1;
    return { order, amplitude, phaseRad: (Math.PI / 2) * (1 - order) };
  });
}

const expected = (level: number, count: number): Float64Array =>
  Float64Array.from({ length: 1024 }, (_, point) =>
    clippedPartials(level, count)
      .slice(1)
      .reduce(
        (sum, { order, amplitude, phaseRad }) =>
          sum + amplitude * Math.sin((2 * Math.PI * order * point) / 1024 + phaseRad),
        0,
      ),
  );

const greatestDifference = (one: ArrayLike<number>, other: ArrayLike<number>): number =>
  Math.max(...Array.from(one, (value, index) => Math.abs(value - other[index])));

describe('the residual over the wave', () => {
  // Closed form of section 15, synthesised additively to 20 orders, so that nothing folds back.
  it.each([
    { name: 'between bins', frequencyHz: 997.13, rate: 48000 },
    { name: 'sharing the clock, 48 phases', frequencyHz: 1000, rate: 48000 },
    { name: 'sharing the clock at another phase count', frequencyHz: 1050, rate: 44100 },
  ])('is the closed form of a clipped positive half, $name', async ({ frequencyHz, rate }) => {
    const partials = clippedPartials(0.763, 20).map(({ order, amplitude, phaseRad }) => ({
      frequencyHz: order * frequencyHz,
      amplitude: 0.5 * amplitude,
      phaseRad: phaseRad + order * 1.1, // the record starts anywhere in the period
    }));
    const residual = await residualOf(synthesise(rate * 4, rate, partials), rate);
    expect(residual.x.length).toBe(1024);
    expect(residual.x[256]).toBe(90);
    expect(
      greatestDifference(
        residual.y,
        expected(0.763, 20).map((value) => 0.5 * value),
      ),
    ).toBeLessThan(1e-8);
  });

  it('shows which half is flattened, and turns over with the polarity', async () => {
    const clipped = clip(sine(48000 * 3, 48000, 997, 0.9, 0.4), -1, 0.7);
    const lowest = ({ x, y }: Trace): number => x[Array.from(y).indexOf(Math.min(...Array.from(y)))];
    const highest = ({ x, y }: Trace): number => x[Array.from(y).indexOf(Math.max(...Array.from(y)))];
    const residual = await residualOf(clipped, 48000);
    // The sharp dip is at the crest that was cut: 90° is the top of the positive half.
    expect(Math.abs(lowest(residual) - 90)).toBeLessThan(3);
    const inverted = await residualOf(
      clipped.map((x) => -x),
      48000,
    );
    expect(Math.abs(highest(inverted) - 270)).toBeLessThan(3);
  });

  it('isn’t smeared by a clock that drifts over a long file', async () => {
    // 40 ppm of drift over 60 s: the last period lies 1.2 periods from where a steady clock would put it.
    const rate = 48000;
    const phase = (n: number): number => {
      const t = n / rate;
      return 997 * (t + (40e-6 * t * t) / (2 * 60));
    };
    const partials = clippedPartials(0.763, 8);
    const samples = Float64Array.from({ length: rate * 60 }, (_, n) => {
      const turns = phase(n) % 1;
      return partials.reduce(
        (sum, { order, amplitude, phaseRad }) =>
          sum + 0.5 * amplitude * Math.sin(2 * Math.PI * order * turns + phaseRad),
        0,
      );
    });
    const residual = await residualOf(samples, rate);
    const shape = expected(0.763, 8).map((value) => 0.5 * value);
    // Within a frame of 5.5 s the drift turns the tone by up to 0.004 of a period: what is left of that.
    expect(greatestDifference(residual.y, shape)).toBeLessThan(0.002 * Math.max(...shape));
  });

  it('averages noise away', async () => {
    const noisy = mix(
      sine(48000 * 20, 48000, 997, 0.5),
      sine(48000 * 20, 48000, 1994, 1e-4, 0.3),
      whiteNoise(48000 * 20, 1e-3, 4),
    );
    const residual = await residualOf(quantise(noisy, 24, createRandom(2)), 48000);
    const values = Array.from(residual.y);
    expect(Math.max(...values)).toBeGreaterThan(0.9e-4);
    // Noise of 1e-3 FS: the harmonics' places hold 1e-3 · sqrt(2 · 23 / 960,000) of it, some 7e-6.
    expect(Math.max(...values)).toBeLessThan(1.35e-4);
  });
});
