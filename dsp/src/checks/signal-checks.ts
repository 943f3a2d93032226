import jitter from '../../../test-vectors/jitter/jitter.json' with { type: 'json' };
import loudness from '../../../test-vectors/loudness/loudness.json' with { type: 'json' };
import twoTone from '../../../test-vectors/two-tone/closed-form.json' with { type: 'json' };
import { clipForDeviation, oneSidedFundamental, twoSidedFundamental } from '../findings/clip-forms.js';
import { jitterMeasure } from '../measures/jitter/jitter-measure.js';
import { patternLines } from '../measures/jitter/pattern-lines.js';
import { levelStepsMeasure } from '../measures/level-steps/level-steps-measure.js';
import { designKWeighting, gainDbOf } from '../measures/loudness/k-weighting.js';
import { loudnessMeasure } from '../measures/loudness/loudness-measure.js';
import { analyseSamples, numberOf } from '../measures/testing/analyse-samples.js';
import { twoToneMeasure } from '../measures/two-tone/two-tone-measure.js';
import { createStimulus } from '../stimulus/create-stimulus.js';
import { bend, synthesise } from '../testing/signals.js';
import type { Check } from './check.js';

const RATE_HZ = 48_000;

/** Two tones through a known bend, read by the whole measure. */
const pairChecks: readonly Check[] = twoTone.cases
  .filter((row): row is typeof row & { modulationTotal_RSS_of_pairs: number } =>
    Boolean((row as { modulationTotal_RSS_of_pairs?: number }).modulationTotal_RSS_of_pairs),
  )
  .map(({ A1, A2, a2, a3, modulationTotal_RSS_of_pairs: ratio }, index) => ({
    id: `two-tone/modulation/${index}`,
    source: twoTone.source,
    expected: 20 * Math.log10(ratio),
    tolerance: 0.001,
    unit: 'dB',
    compute: async () => {
      const tones = synthesise(3 * RATE_HZ, RATE_HZ, [
        { frequencyHz: 60.3, amplitude: A1, phaseRad: 0.3 },
        { frequencyHz: 7000.9, amplitude: A2, phaseRad: 1.1 },
      ]);
      const record = await analyseSamples(twoToneMeasure, [bend(tones, [1, a2, a3])], RATE_HZ);
      return numberOf(record.channels[0], 'modulationDistortionDb');
    },
  }));

const jitterChecks: readonly Check[] = [
  ...jitter.rows
    .filter(({ f0Hz, peakJitterS }) => f0Hz === 11_025 && peakJitterS >= 1e-11 && peakJitterS <= 1e-9)
    .map(({ f0Hz, peakJitterS, ppS }) => ({
      id: `jitter/sine/${peakJitterS}`,
      source: jitter.source,
      expected: ppS * 1e12,
      tolerance: ppS * 1e12 * 0.02,
      unit: 'ps',
      compute: async () => {
        const rate = 44_100;
        const samples = Float64Array.from({ length: 4 * rate }, (_, n) => {
          const t = n / rate;
          return 0.7 * Math.sin(2 * Math.PI * f0Hz * (t + peakJitterS * Math.sin(2 * Math.PI * 233.7 * t)));
        });
        const record = await analyseSamples(jitterMeasure, [samples], rate);
        return numberOf(record.channels[0], 'jitterPeakToPeakPs');
      },
    })),
  ...(
    [
      [16, 'lower', 1, -123.79],
      [16, 'upper', 1, -124.07],
      [16, 'lower', 3, -123.49],
      [16, 'upper', 3, -124.34],
      [24, 'lower', 1, -171.95],
      [24, 'upper', 1, -172.24],
    ] as const
  ).map(([bits, side, multiple, expected]) => ({
    id: `jitter/pattern/${bits}/${side}/${multiple}`,
    source: 'exact transform of the 192-sample pattern of Dunn and Dennis, 96th AES Convention, 1994',
    expected,
    tolerance: 0.01,
    unit: 'dBr',
    compute: () => 20 * Math.log10(patternLines(bits)[side][multiple]),
  })),
];

const loudnessChecks: readonly Check[] = [
  ...loudness.kGain.map(({ hz, db48k }) => ({
    id: `loudness/k-weighting/${hz}`,
    source: loudness.source,
    expected: db48k,
    tolerance: 1e-6,
    unit: 'dB',
    compute: () => gainDbOf(designKWeighting(48_000), hz, 48_000),
  })),
  ...[-23, -33].map((level) => ({
    id: `loudness/sine/${level}`,
    source: 'EBU Tech 3341 (2023), Table 1, cases 1 and 2',
    expected: level,
    tolerance: 0.1,
    unit: 'LUFS',
    compute: async () => {
      const samples = synthesise(6 * RATE_HZ, RATE_HZ, [
        { frequencyHz: 1000, amplitude: 10 ** (level / 20) },
      ]);
      const record = await analyseSamples(loudnessMeasure, [samples, samples], RATE_HZ);
      return Number(record.between.figures['integratedLufs']);
    },
  })),
];

/** Level steps through a clip: one recording serves every level. */
async function clippedSteps(low: number, high: number): Promise<ReadonlyMap<number, number>> {
  const { source } = createStimulus('level-steps', { sampleRateHz: RATE_HZ, bitsPerSample: 24 });
  const [left] = await source.read(0, source.frameCount);
  const clipped = left.map((x) => Math.max(low, Math.min(high, x)));
  const record = await analyseSamples(levelStepsMeasure, [clipped], RATE_HZ);
  const { x, y } = record.channels[0].traces['deviation'];
  return new Map(Array.from(x, (level, index) => [level, y[index]]));
}

const stepChecks: readonly Check[] = (
  [
    ['one-sided', -2, 0.763, oneSidedFundamental],
    ['symmetric', -0.8, 0.8, twoSidedFundamental],
  ] as const
).flatMap(([kind, low, high, fundamental]) =>
  [0, -1, -2, -6].map((level) => ({
    id: `level-steps/${kind}/${level}`,
    source:
      'Fourier series of a clipped sine: fundamental 1 - (p - c sin p)/π on one half, (2/π)(t + c cos t) on both',
    expected: 20 * Math.log10(fundamental(Math.min(1, high / 10 ** (level / 20)))),
    tolerance: 0.002,
    unit: 'dB',
    compute: async () => (await clippedSteps(low, high)).get(level) ?? Number.NaN,
  })),
);

const clipChecks: readonly Check[] = (
  [
    [oneSidedFundamental, 0.9, 0.981307],
    [oneSidedFundamental, 0.5, 0.804499],
    [oneSidedFundamental, 0.25, 0.657481],
    [twoSidedFundamental, 0.9, 0.962614],
    [twoSidedFundamental, 0.5, 0.608998],
    [twoSidedFundamental, 0.25, 0.314962],
  ] as const
).map(([fundamental, c, published]) => ({
  id: `findings/clip-from-level/${fundamental.name}/${c}`,
  source: 'published table of clipped sines, fundamental against clip level',
  expected: c,
  tolerance: 1e-5,
  unit: 'FS',
  compute: () => clipForDeviation(fundamental, 20 * Math.log10(published)),
}));

/** Values of signals with known answers that the measures of tones, steps, clocks and loudness must reach in every runtime. */
export const signalChecks: readonly Check[] = [
  ...pairChecks,
  ...jitterChecks,
  ...loudnessChecks,
  ...stepChecks,
  ...clipChecks,
];
