import closedForm from '../../../test-vectors/distortion/closed-form.json' with { type: 'json' };
import { dynamicRangeMeasure } from '../measures/dynamic-range/dynamic-range-measure.js';
import { analyseSamples, numberOf } from '../measures/testing/analyse-samples.js';
import { toneMeasure } from '../measures/tone/tone-measure.js';
import { createRandom } from '../random/create-random.js';
import { bend, clip, mix, quantise, sine, sineOfCycles, whiteNoise } from '../testing/signals.js';
import type { Check } from './check.js';

const N = 65_536;
const CYCLES = 1361;

/** Level of a harmonic as the whole measure gives it, over every sample of one second. */
async function measuredHarmonicDb(samples: Float64Array, order: number): Promise<number> {
  const record = await analyseSamples(toneMeasure, [samples], N, { fromS: 0, toS: 1 });
  return record.channels[0].harmonics.find((harmonic) => harmonic.order === order)?.levelDbr ?? Number.NaN;
}

interface ClosedFormRow {
  readonly level: number;
  readonly harmonicsDb: readonly (number | null)[];
}

interface Bend {
  readonly name: string;
  readonly rows: readonly ClosedFormRow[];
  readonly orders: readonly number[];
  readonly apply: (samples: Float64Array, level: number) => Float64Array;
}

const BENDS: readonly Bend[] = [
  {
    name: 'clip-both-halves',
    rows: closedForm.clipTwoSided,
    orders: [3, 5],
    apply: (samples, level) => clip(samples, -level, level),
  },
  {
    name: 'clip-one-half',
    rows: closedForm.clipOneSided,
    orders: [2, 3],
    apply: (samples, level) => clip(samples, -2, level),
  },
  {
    name: 'dead-zone',
    rows: closedForm.deadZone,
    orders: [3, 5],
    apply: (samples, level) => samples.map((x) => x - Math.max(-level, Math.min(level, x))),
  },
];

const bendChecks: readonly Check[] = BENDS.flatMap(({ name, rows, orders, apply }) =>
  rows.flatMap(({ level, harmonicsDb }) =>
    orders.map((order) => ({
      id: `tone/${name}/${level}/harmonic-${order}`,
      source: closedForm.source,
      expected: harmonicsDb[order - 2] ?? Number.NaN,
      // What folds back lies between the low harmonics and leaks into them at most so far.
      tolerance: 0.01,
      unit: 'dBr',
      compute: () => measuredHarmonicDb(apply(sineOfCycles(N, CYCLES), level), order),
    })),
  ),
);

const polynomialChecks: readonly Check[] = [
  { id: 'C-5.2', order: 2, coefficients: [1, 1e-3], expected: -66.0206 },
  { id: 'C-5.3', order: 3, coefficients: [1, 0, 1e-3], expected: -72.0477 },
].map(({ id, order, coefficients, expected }) => ({
  id: `tone/polynomial/${id}`,
  source: 'x² = (1 - cos 2u)/2 and sin³u = (3 sin u - sin 3u)/4: closed form',
  expected,
  tolerance: 0.001,
  unit: 'dBr',
  compute: () => measuredHarmonicDb(bend(sineOfCycles(N, CYCLES + 0.37), coefficients), order),
}));

const noiseCheck: Check = {
  id: 'tone/thd-plus-noise/C-5.4',
  source:
    'powers added: H2 at -100 dBc, white noise of -100 dBFS over 24 kHz, the tone at -1 dBFS, 20 Hz to 20 kHz',
  expected: -96.8866,
  tolerance: 0.05, // five standard deviations of noise over 20 s and 20 kHz
  unit: 'dB',
  async compute() {
    const rate = 48_000;
    const amplitude = 10 ** (-1 / 20);
    const length = rate * 20;
    const samples = mix(
      sine(length, rate, 997.37, amplitude),
      sine(length, rate, 2 * 997.37, amplitude * 1e-5),
      whiteNoise(length, Math.SQRT1_2 * 1e-5, 11),
    );
    const record = await analyseSamples(toneMeasure, [samples], rate);
    return numberOf(record.channels[0], 'thdPlusNoiseDb');
  },
};

const dynamicRangeChecks: readonly Check[] = [
  { id: 'C-6.1', rate: 44_100, bits: 16, expected: 93.75 },
  { id: 'C-6.2', rate: 48_000, bits: 16, expected: 94.12 },
  { id: 'C-6.3', rate: 44_100, bits: 24, expected: 141.91 },
  { id: 'C-6.4', rate: 48_000, bits: 24, expected: 142.28 },
].map(({ id, rate, bits, expected }) => ({
  id: `dynamic-range/ideal-converter/${id}`,
  source:
    'noise of triangular dither, 1/4 LSB² (Lipshitz, Wannamaker and Vanderkooy 1992), in 20 Hz to 20 kHz; AES17-2015, 6.4.1',
  expected,
  tolerance: 0.05,
  unit: 'dB',
  async compute() {
    const samples = quantise(sine(rate * 20, rate, 997, 1e-3), bits, createRandom(bits));
    const record = await analyseSamples(dynamicRangeMeasure, [samples], rate, { bits });
    return numberOf(record.channels[0], 'dynamicRangeDb');
  },
}));

/** Whole measures against closed forms. */
export const measureChecks: readonly Check[] = [
  ...bendChecks,
  ...polynomialChecks,
  noiseCheck,
  ...dynamicRangeChecks,
];
