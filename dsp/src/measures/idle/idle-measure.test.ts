import { describe, expect, it } from 'vitest';
import { createRandom } from '../../random/create-random.js';
import { mix, quantise, synthesise, whiteNoise } from '../../testing/signals.js';
import { analyseSamples, numberOf, warningCodes } from '../testing/analyse-samples.js';
import { idleMeasure } from './idle-measure.js';

const RATE = 48000;

it('reads white noise through every weighting', async () => {
  const { channels } = await analyseSamples(idleMeasure, [whiteNoise(RATE * 20, 1e-4, 6)], RATE);
  const [left] = channels;
  // Closed form: 1e-4 RMS is -76.990 dBFS (C-3.1), less 10 lg(19980/24000) in the band; offsets of section 6's table.
  const flat = -76.99 + 10 * Math.log10(19980 / 24000);
  expect(Math.abs(numberOf(left, 'noiseDbfs') - flat)).toBeLessThan(0.05);
  expect(Math.abs(numberOf(left, 'noiseAWeightedDbfs') - flat + 2.048)).toBeLessThan(0.05);
  expect(Math.abs(numberOf(left, 'noiseItu468RmsDbfs') - flat - 1.671)).toBeLessThan(0.05);
});

describe('hum', () => {
  // Closed form: the lines are given; hum is their root of squares.
  it.each([
    { grid: 50, actual: 49.963 },
    { grid: 60, actual: 60.021 },
    { grid: 50, actual: 50.2 },
  ])('of a $grid Hz grid at $actual Hz is found and measured', async ({ actual }) => {
    const lines = [1, 2, 3, 5, 7].map((order) => ({
      frequencyHz: order * actual,
      amplitude: 1e-4 / order,
      phaseRad: order,
    }));
    const samples = mix(synthesise(RATE * 8, RATE, lines), whiteNoise(RATE * 8, 1e-6, 9));
    const { channels, warnings } = await analyseSamples(idleMeasure, [samples], RATE);
    const [left] = channels;
    expect(numberOf(left, 'mainsFrequencyHz')).toBeCloseTo(actual, 2);
    const sum = lines.reduce((total, { amplitude }) => total + amplitude ** 2, 0);
    expect(numberOf(left, 'humDbfs')).toBeCloseTo(10 * Math.log10(sum), 1);
    expect(left.components.filter(({ kind }) => kind === 'mains')).toHaveLength(5);
    expect(left.components[0]['levelDbfs']).toBeCloseTo(-80, 1);
    expect(warnings).toEqual([]);
  });

  it('is null with a warning where there is none, or too little time to tell', async () => {
    const long = await analyseSamples(idleMeasure, [whiteNoise(RATE * 4, 1e-5, 2)], RATE);
    expect(long.channels[0].figures).toMatchObject({ mainsFrequencyHz: null, humDbfs: null });
    expect(warningCodes(long)).toEqual(['no-hum']);
    const short = await analyseSamples(idleMeasure, [whiteNoise(RATE / 4, 1e-5, 2)], RATE);
    expect(short.channels[0].figures['humDbfs']).toBeNull();
    expect(warningCodes(short)).toEqual(['hum-unresolved']);
  });
});

it('tells lines of USB frames from others, and finds no line in noise alone', async () => {
  const lines = [
    { frequencyHz: 1000.02, amplitude: 3e-5 },
    { frequencyHz: 8000.16, amplitude: 2e-5 },
    { frequencyHz: 12345.6, amplitude: 1e-5 },
  ];
  const noise = whiteNoise(RATE * 8, 1e-5, 3);
  const { channels } = await analyseSamples(
    idleMeasure,
    [mix(synthesise(RATE * 8, RATE, lines), noise), noise],
    RATE,
  );
  expect(channels[0].components.map(({ kind }) => kind)).toEqual(['frame', 'frame', 'unknown']);
  expect(channels[0].components[2]['frequencyHz']).toBeCloseTo(12345.6, 1);
  expect(channels[1].components).toEqual([]);
});

it('states a muted recording instead of a noise', async () => {
  const record = await analyseSamples(
    idleMeasure,
    [new Float64Array(RATE * 2), whiteNoise(RATE * 2, 1e-5, 1)],
    RATE,
  );
  expect(Object.values(record.channels[0].figures).every((figure) => figure === null)).toBe(true);
  const warning = record.warnings.find(({ code }) => code === 'digital-silence')!;
  expect(warning.channel).toBe('left');
  expect(warning.figures).toContain('noiseDbfs');
  expect(record.channels[1].figures['noiseDbfs']).not.toBeNull();
});

it('shows a quantiser’s own noise as such', async () => {
  // Section 14's table: 16 bits with triangular dither, -94.115 dBFS in the band at 48 kHz.
  const samples = quantise(new Float64Array(RATE * 10), 16, createRandom(3));
  const { channels } = await analyseSamples(idleMeasure, [samples], RATE, { bits: 16 });
  expect(Math.abs(numberOf(channels[0], 'noiseDbfs') + 94.115)).toBeLessThan(0.05);
  expect(channels[0].limits['noiseDbfs'].by).toBe('quantisation');
});

it('says so when something is played', async () => {
  const record = await analyseSamples(
    idleMeasure,
    [synthesise(RATE * 2, RATE, [{ frequencyHz: 997, amplitude: 0.1 }])],
    RATE,
  );
  expect(warningCodes(record)).toContain('signal-present');
});
