import butterworth from '../../../test-vectors/filter/butterworth.json' with { type: 'json' };
import { filterMeasure } from '../measures/filter/filter-measure.js';
import type { Measure } from '../measures/measure.js';
import { separationMeasure } from '../measures/separation/separation-measure.js';
import { sweepMeasure } from '../measures/sweep/sweep-measure.js';
import { analyseSamples, numberOf } from '../measures/testing/analyse-samples.js';
import type { PracticeStage } from '../practice/device.js';
import { pass } from '../practice/testing/pass.js';
import type { BenchRecord } from '../record/record.js';
import { createStimulus } from '../stimulus/create-stimulus.js';
import { planSweep } from '../stimulus/sweep-signal.js';
import type { Check } from './check.js';

async function play(
  name: string,
  measure: Measure,
  stages: readonly PracticeStage[],
  { rate = 96_000, levelDbfs, hold = 1 }: { rate?: number; levelDbfs?: number; hold?: number } = {},
): Promise<BenchRecord> {
  const stimulus = createStimulus(name, {
    sampleRateHz: rate,
    bitsPerSample: '32f',
    ...(levelDbfs === undefined ? {} : { levelDbfs }),
  });
  const file = await stimulus.source.read(0, stimulus.source.frameCount);
  const played = pass(file, rate, stages);
  const recorded = played.map((samples) => holdFor(samples, hold));
  return analyseSamples(measure, recorded, rate * hold, { descriptor: stimulus.describe('') });
}

/** As a converter without a filter does. */
function holdFor(samples: Float64Array, times: number): Float64Array {
  return Float64Array.from({ length: samples.length * times }, (_, n) => samples[Math.floor(n / times)]);
}

/** A left channel's trace at a frequency, linear over log f. */
function traceAt({ channels: [left] }: BenchRecord, name: string, frequencyHz: number): number {
  const { x, y } = left.traces[name];
  let k = 1;
  while (k < x.length - 1 && x[k] < frequencyHz) k++;
  const share = Math.log(frequencyHz / x[k - 1]) / Math.log(x[k] / x[k - 1]);
  return y[k - 1] + share * (y[k] - y[k - 1]);
}

function betweenOf(record: BenchRecord, key: string): number {
  const value = record.between.figures[key];
  return typeof value === 'number' ? value : Number.NaN;
}

const constantChecks: readonly Check[] = [
  { durationS: 5, rateS: 0.7, lead2S: 0.485203026 },
  { durationS: 10, rateS: 1.45, lead2S: 1.005063412 },
].flatMap(({ durationS, rateS, lead2S }) => {
  const planned = () => planSweep(20, 20_000, durationS, { fadeInS: 0, fadeOutS: 0 }).rateS;
  const source =
    'L = round(f1 T / ln(f2/f1)) / f1; harmonic n leads by L ln n (Novak, Simon and Lotton, JAES 63(10), 2015)';
  return [
    {
      id: `sweep/rate/C-10.1/${durationS}`,
      source,
      expected: rateS,
      tolerance: 1e-9,
      unit: 's',
      compute: planned,
    },
    {
      id: `sweep/second-harmonic-lead/C-10.1/${durationS}`,
      source,
      expected: lead2S,
      tolerance: 1e-9,
      unit: 's',
      compute: () => planned() * Math.LN2,
    },
  ];
});

const harmonicChecks: readonly Check[] = [
  { order: 2, amplitude: 0.00125 },
  { order: 3, amplitude: 0.000625 },
].flatMap(({ order, amplitude }) =>
  [200, 1000, 5000].map((frequencyHz) => ({
    id: `sweep/polynomial/C-10.2/harmonic-${order}/${frequencyHz}`,
    source: 'u = 0.5 sin φ through u + 0.01 u² + 0.02 u³, powers of a sine by multiple angles: closed form',
    expected: 20 * Math.log10(amplitude / 0.501875),
    tolerance: 0.01, // what a tapered cut leaves of its neighbours
    unit: 'dBr',
    async compute() {
      const bent: PracticeStage = { kind: 'polynomial', channel: 'both', coefficients: [1, 0.01, 0.02] };
      const record = await play('sweep', sweepMeasure, [bent], { levelDbfs: 20 * Math.log10(0.5) });
      return traceAt(record, `harmonic${order}`, frequencyHz);
    },
  })),
);

const butterworthChecks: readonly Check[] = butterworth.rows.map(({ order, cornerHz, points }) => {
  const levelAt = (hz: number): number =>
    points.find(({ frequencyHz }) => frequencyHz === hz)?.levelDb ?? Number.NaN;
  return {
    id: `sweep/butterworth/${order}/${cornerHz}`,
    source: butterworth.source,
    expected: levelAt(15_000) - levelAt(1000),
    tolerance: 0.01, // a response without noise
    unit: 'dB',
    async compute() {
      const shape = { type: 'low-pass', frequencyHz: cornerHz, order } as const;
      const lowPass: PracticeStage = { kind: 'filter', channel: 'both', ...shape };
      return traceAt(await play('sweep', sweepMeasure, [lowPass]), 'response', 15_000);
    },
  };
});

const onePoleCheck: Check = {
  id: 'sweep/one-pole/C-10.3',
  source:
    'one pole at 1 kHz by the bilinear transform: 1/√(1 + r²) with r = tan(πf/fs)/tan(πf0/fs), 10 kHz against 1 kHz',
  expected: -10 * Math.log10((1 + (Math.tan(Math.PI / 9.6) / Math.tan(Math.PI / 96)) ** 2) / 2),
  tolerance: 0.01,
  unit: 'dB',
  async compute() {
    const pole: PracticeStage = {
      kind: 'filter',
      channel: 'both',
      type: 'low-pass',
      frequencyHz: 1000,
      order: 1,
    };
    return traceAt(await play('sweep', sweepMeasure, [pole]), 'response', 10_000);
  },
};

const RIGHT: readonly PracticeStage[] = [
  { kind: 'crosstalk', channel: 'right', levelDb: -60, slopeDbPerOctave: 0 },
  { kind: 'gain', channel: 'right', gainDb: 20 * Math.log10(0.99) },
];

const separationChecks: readonly Check[] = [
  // The leak passes the right channel's gain of 0.99 too.
  { key: 'separationLeftToRightAt1kHzDb', expected: 60.0873, tolerance: 0.1, unit: 'dB' },
  { key: 'separationLeftToRightAt10kHzDb', expected: 60.0873, tolerance: 0.1, unit: 'dB' },
  { key: 'balanceDb', expected: -0.0873, tolerance: 0.001, unit: 'dB' },
].map(({ key, ...check }) => ({
  ...check,
  id: `separation/${key}`,
  source: 'gains set: a leak of -60 dB into right, then right times 0.99 (-0.0873 dB): closed form',
  compute: async () => betweenOf(await play('separation', separationMeasure, RIGHT, { rate: 48_000 }), key),
}));

const delayCheck: Check = {
  id: 'separation/interchannelDelayS',
  source: 'the delay set, 0.16176 samples at 48 kHz = 3.37 µs',
  expected: 3.37e-6,
  tolerance: 0.01 / 48_000, // a hundredth of a sample
  unit: 's',
  async compute() {
    const late: PracticeStage = { kind: 'delay', channel: 'right', samples: 3.37e-6 * 48_000 };
    return betweenOf(
      await play('separation', separationMeasure, [late], { rate: 48_000 }),
      'interchannelDelayS',
    );
  },
};

/** Mean power gain between two shares of the rate of samples held `times` over: the sum of a geometric series. */
function heldPower(low: number, high: number, times: number): number {
  let sum = 0;
  for (let n = 0; n < 1000; n++) {
    const x = Math.PI * (low + ((n + 0.5) * (high - low)) / 1000);
    sum += (Math.sin(x) / (times * Math.sin(x / times))) ** 2 / 1000;
  }
  return sum;
}

const imageChecks: readonly Check[] = [2, 4].map((hold) => ({
  id: `filter/held-samples/${hold}`,
  source:
    'sin(πf/fs) / (R sin(πf/(R fs))) of samples held R times, power mean over the band and its image: closed form',
  expected: 10 * Math.log10(heldPower(0.25, 0.45, hold) / heldPower(0.55, 0.75, hold)),
  tolerance: 0.1, // four standard deviations of noise over a fifth of the rate and 10 s
  unit: 'dB',
  async compute() {
    const record = await play('white-noise', filterMeasure, [], { rate: 48_000, hold });
    return numberOf(record.channels[0], 'imageRejectionDb');
  },
}));

/** Whole measures against closed forms and a general-purpose library. */
export const responseChecks: readonly Check[] = [
  ...constantChecks,
  ...harmonicChecks,
  ...butterworthChecks,
  onePoleCheck,
  ...separationChecks,
  delayCheck,
  ...imageChecks,
];
