import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { PracticeStage } from '../practice/device.js';
import { pass } from '../practice/testing/pass.js';
import type { BenchRecord, FigureValue, MeasureId } from '../record/record.js';
import { createStimulus } from '../stimulus/create-stimulus.js';
import type { StimulusOptions } from '../stimulus/stimulus-options.js';
import { getMeasure } from './registry.js';
import { analyseSamples } from './testing/analyse-samples.js';

// What a chain may change without changing what is measured: gain, polarity, delay, the clock, which channel is which.

const RATE_HZ = 44_100;

interface Case {
  readonly name: string;
  readonly measure: MeasureId;
  readonly options?: Partial<StimulusOptions>;
  /** A fault that is to be seen alike whatever the chain does besides. */
  readonly fault: readonly PracticeStage[];
  /** Figures that follow the gain, in dB. */
  readonly levels: readonly string[];
  /** How well the others must agree, in their own unit. */
  readonly tolerance: number;
}

const bent: PracticeStage = { kind: 'polynomial', channel: 'both', coefficients: [1, 1e-3, 1e-3] };

const CASES: readonly Case[] = [
  { name: 'level-steps', measure: 'level-steps', fault: [bent], levels: [], tolerance: 0.002 },
  {
    name: 'modulation-pair',
    measure: 'two-tone',
    options: { durationS: 3 },
    fault: [bent],
    levels: ['lowToneLevelDbfs', 'highToneLevelDbfs'],
    tolerance: 0.02,
  },
  {
    name: 'sweep',
    measure: 'sweep',
    options: { durationS: 3 },
    fault: [{ kind: 'filter', channel: 'both', type: 'low-pass', frequencyHz: 9000, order: 1 }],
    levels: [],
    tolerance: 0.01,
  },
  {
    name: 'multitone',
    measure: 'multitone',
    options: { durationS: 4 },
    fault: [bent],
    levels: [],
    tolerance: 0.05,
  },
  {
    name: 'jitter-test',
    measure: 'jitter',
    options: { durationS: 4 },
    fault: [{ kind: 'jitter', channel: 'both', peakToPeakPs: 2000, frequencyHz: 310 }],
    levels: [],
    tolerance: 20,
  },
];

/** Frequencies move with the clock, by parts in a million; that is the clock's business. */
const isFrequency = (key: string): boolean => key.endsWith('Hz');

async function measured(
  { name, measure, options }: Case,
  stages: readonly PracticeStage[],
): Promise<BenchRecord> {
  const { source } = createStimulus(name, { sampleRateHz: RATE_HZ, bitsPerSample: 24, ...options });
  const channels = pass(await source.read(0, source.frameCount), RATE_HZ, stages);
  return analyseSamples(getMeasure(measure), channels, RATE_HZ, {
    descriptor: createStimulus(name, { sampleRateHz: RATE_HZ, bitsPerSample: 24, ...options }).describe(''),
  });
}

const numbers = (figures: Readonly<Record<string, FigureValue>>): [string, number][] =>
  Object.entries(figures).filter((entry): entry is [string, number] => typeof entry[1] === 'number');

describe('a chain that only turns, shifts and scales', () => {
  it.each(CASES)('changes nothing else in $name', async (entry) => {
    const plain = await measured(entry, entry.fault);
    await fc.assert(
      fc.asyncProperty(
        fc.double({ min: -12, max: -0.5, noNaN: true }),
        fc.boolean(),
        fc.double({ min: 1e-3, max: 3000, noNaN: true }),
        fc.integer({ min: -200, max: 200 }),
        async (gainDb, isInverted, samples, ppm) => {
          const record = await measured(entry, [
            ...entry.fault,
            { kind: 'gain', channel: 'both', gainDb },
            ...(isInverted ? ([{ kind: 'polarity', channel: 'both' }] as const) : []),
            { kind: 'clock', channel: 'both', ppm },
            { kind: 'delay', channel: 'both', samples },
          ]);
          record.channels.forEach(({ figures }, index) => {
            for (const [key, value] of numbers(plain.channels[index].figures)) {
              const moved = figures[key];
              expect(typeof moved, key).toBe('number');
              if (isFrequency(key)) expect(Number(moved) / value).toBeCloseTo(1, 2);
              else {
                const expected = entry.levels.includes(key) ? value + gainDb : value;
                expect(Math.abs(Number(moved) - expected), key).toBeLessThan(entry.tolerance);
              }
            }
          });
          // Told to 1 ppm by contract.
          expect(Math.abs((record.stimulus?.clockOffsetPpm ?? 0) - ppm)).toBeLessThan(1);
          expect(record.stimulus?.polarity).toBe(isInverted ? 'inverted' : 'same');
        },
      ),
      { numRuns: 2, endOnFailure: true },
    );
  });
});

describe('channels', () => {
  it('that change places take their figures with them', async () => {
    const { source } = createStimulus('level-steps', { sampleRateHz: RATE_HZ, bitsPerSample: 24 });
    const [left, right] = pass(await source.read(0, source.frameCount), RATE_HZ, [
      { kind: 'clip', channel: 'left', positive: 0.8, negative: 2 },
      { kind: 'gain', channel: 'right', gainDb: -2 },
    ]);
    const one = await analyseSamples(getMeasure('level-steps'), [left, right], RATE_HZ);
    const other = await analyseSamples(getMeasure('level-steps'), [right, left], RATE_HZ);
    for (const [index, { figures }] of one.channels.entries()) {
      for (const [key, value] of numbers(figures)) {
        expect(Number(other.channels[1 - index].figures[key])).toBeCloseTo(value, 6);
      }
    }
  });
});
