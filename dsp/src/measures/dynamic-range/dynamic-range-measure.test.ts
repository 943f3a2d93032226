import { describe, expect, it } from 'vitest';
import { createRandom } from '../../random/create-random.js';
import { mix, quantise, sine, synthesise, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { dynamicRangeMeasure } from './dynamic-range-measure.js';

describe('dynamic range of an ideal converter with triangular dither', () => {
  // C-6.1 to C-6.4 (computed from the dither's noise; AES17-2015, 6.4.1 for the figure).
  it.each([
    { rate: 44100, bits: 16, flat: 93.75, a: 95.8, rms: 92.08 },
    { rate: 48000, bits: 16, flat: 94.12, a: 96.16, rms: 92.44 },
    { rate: 44100, bits: 24, flat: 141.91, a: 143.96, rms: 140.24 },
    { rate: 48000, bits: 24, flat: 142.28, a: 144.33, rms: 140.61 },
  ])('is right at $rate Hz and $bits bits', async ({ rate, bits, flat, a, rms }) => {
    const samples = quantise(sine(rate * 20, rate, 997, 1e-3), bits, createRandom(bits));
    const record = await analyseSamples(dynamicRangeMeasure, [samples], rate, { bits });
    const [left] = record.channels;
    // 0.05 dB: the tolerance for random noise (docs/record.md).
    expect(Math.abs(numberOf(left, 'dynamicRangeDb') - flat)).toBeLessThan(0.05);
    expect(Math.abs(numberOf(left, 'dynamicRangeAWeightedDb') - a)).toBeLessThan(0.06);
    expect(Math.abs(numberOf(left, 'dynamicRangeItu468RmsDb') - rms)).toBeLessThan(0.06);
    expect(left.limits['dynamicRangeDb'].by).toBe('quantisation');
    expect(left.limits['dynamicRangeDb'].floor).toBeCloseTo(flat, 1);
    expect(warningCodes(record)).toContain('level-assumed');
  });
});

it('keeps harmonics in the residual', async () => {
  // Closed form: a harmonic at -110 dBFS beside the -60 dBFS tone is all there is: 110 dB.
  const partials = [
    { frequencyHz: 997, amplitude: 1e-3 },
    { frequencyHz: 1994, amplitude: 10 ** (-110 / 20) },
  ];
  const { channels } = await analyseSamples(
    dynamicRangeMeasure,
    [synthesise(48000 * 4, 48000, partials)],
    48000,
  );
  expect(numberOf(channels[0], 'dynamicRangeDb')).toBeCloseTo(110, 3);
});

it('doesn’t change with the gain between unit and recorder, and says where the unit’s full scale lies', async () => {
  const clean = mix(sine(48000 * 4, 48000, 997, 1e-3), whiteNoise(48000 * 4, 1e-5, 1));
  const loud = await analyseSamples(dynamicRangeMeasure, [clean], 48000);
  const quiet = await analyseSamples(dynamicRangeMeasure, [clean.map((x) => x / 4)], 48000);
  expect(numberOf(quiet.channels[0], 'dynamicRangeDb')).toBeCloseTo(
    numberOf(loud.channels[0], 'dynamicRangeDb'),
    6,
  );
  expect(quiet.reference.unitFullScaleDbfs).toBeCloseTo(20 * Math.log10(0.25), 2);
});

it('looks for the 997 Hz tone beside stronger hum, and doubts a loud one', async () => {
  const partials = [
    { frequencyHz: 997, amplitude: 1e-3 },
    { frequencyHz: 50, amplitude: 4e-3 },
  ];
  const hum = await analyseSamples(dynamicRangeMeasure, [synthesise(48000 * 4, 48000, partials)], 48000);
  expect(numberOf(hum.channels[0], 'fundamentalFrequencyHz')).toBeCloseTo(997, 3);
  const loud = await analyseSamples(dynamicRangeMeasure, [sine(48000 * 2, 48000, 997, 0.5)], 48000);
  expect(warningCodes(loud)).toContain('level-unexpected');
});
