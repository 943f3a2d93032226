import { meanSquareToDbfs, powerToDb, ratioToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { Figures, FigureLimit, Trace, Warning } from '../../record/record.js';
import { bareLimit } from '../shared/limits.js';
import { shortNumber } from '../shared/settings-band.js';
import type { UncertaintyComponent } from '../shared/uncertainty.js';
import type { LevelStep } from './read-steps.js';

export const STEP_FIGURES = ['linearDownToDbfs', 'maxDeviationDb', 'fullScaleGainErrorDb'] as const;

/** Deviation is against the step at this level … */
const REFERENCE_DBFS = -20;
/** … or the nearest within this. */
const REFERENCE_REACH_DB = 3;
/** Within this a step still follows. */
const LINEAR_DB = 0.5;
const DEEPEST_FOR_MAXIMUM_DBFS = -60;
const FULL_SCALE_DBFS = -0.05;
const HIGHEST_TRACED_HARMONIC = 5;

/** A step whose level is known, with its deviation from the reference step. */
interface Deviation {
  readonly step: LevelStep & { readonly tone: number };
  readonly deviationDb: number;
  /** Standard uncertainty by noise, the reference step's included. */
  readonly standardDb: number;
}

export interface StepResult {
  readonly figures: Figures;
  readonly components: Readonly<Record<string, readonly UncertaintyComponent[]>>;
  readonly limits: Readonly<Record<string, FigureLimit>>;
  readonly traces: Readonly<Record<string, Trace>>;
  readonly warnings: readonly Warning[];
  /** Level that a 0 dBFS step would have without any bend, dBFS; null without a step that follows. */
  readonly fullScaleDbfs: number | null;
}

/** Turns one channel's steps into figures and traces against the stimulus's level. */
export function stepResult(channel: string, steps: readonly LevelStep[]): StepResult {
  const rising = [...steps].sort((one, other) => one.stimulusDbfs - other.stimulusDbfs);
  const known = rising.filter((step): step is Deviation['step'] => step.tone !== null);
  const reference = pickReference(known);
  const deviations = known.map((step): Deviation => ({
    step,
    deviationDb: deviationOf(step, reference),
    standardDb: step === reference ? 0 : Math.hypot(step.deviationDb, reference.deviationDb),
  }));
  const top = deviations[deviations.length - 1];
  const isFullScale = top.step.stimulusDbfs >= FULL_SCALE_DBFS && rising[rising.length - 1] === top.step;
  const largest = deviations
    .filter(({ step }) => step.stimulusDbfs >= DEEPEST_FOR_MAXIMUM_DBFS)
    .reduce<Deviation | null>(
      (one, other) => (one === null || Math.abs(other.deviationDb) > Math.abs(one.deviationDb) ? other : one),
      null,
    );
  const linear = linearDownTo(rising, deviations, reference);
  const lost = rising.filter(({ tone }) => tone === null);
  const estimate = (value: number): UncertaintyComponent[] => [{ name: 'estimate', value }];
  return {
    figures: {
      linearDownToDbfs: linear.levelDbfs,
      maxDeviationDb: largest?.deviationDb ?? null,
      fullScaleGainErrorDb: isFullScale ? top.deviationDb : null,
    },
    components: {
      ...(largest ? { maxDeviationDb: estimate(largest.standardDb) } : {}),
      ...(isFullScale ? { fullScaleGainErrorDb: estimate(top.standardDb) } : {}),
    },
    limits: linear.isByNoise ? { linearDownToDbfs: bareLimit('noise') } : {},
    traces: stepTraces(rising, deviations),
    warnings: [
      ...(Math.abs(reference.stimulusDbfs - REFERENCE_DBFS) > REFERENCE_REACH_DB
        ? [makeWarning('no-reference-step', { level: shortNumber(reference.stimulusDbfs) }, { channel })]
        : []),
      ...(lost.length > 0 && known.length > 0
        ? [
            makeWarning(
              'steps-in-noise',
              { level: shortNumber(known[0].stimulusDbfs), channel },
              { channel, figures: ['linearDownToDbfs'] },
            ),
          ]
        : []),
    ],
    fullScaleDbfs: meanSquareToDbfs(reference.tone) - reference.stimulusDbfs,
  };
}

/** The step at -20 dBFS, else the nearest to it. */
function pickReference(known: readonly Deviation['step'][]): Deviation['step'] {
  return known.reduce((one, other) =>
    Math.abs(other.stimulusDbfs - REFERENCE_DBFS) < Math.abs(one.stimulusDbfs - REFERENCE_DBFS) ? other : one,
  );
}

function deviationOf(step: Deviation['step'], reference: Deviation['step']): number {
  return powerToDb(step.tone / reference.tone) - (step.stimulusDbfs - reference.stimulusDbfs);
}

/** Going down from the reference, the last step before the first that no longer follows. */
function linearDownTo(
  rising: readonly LevelStep[],
  deviations: readonly Deviation[],
  reference: LevelStep,
): { levelDbfs: number | null; isByNoise: boolean } {
  let levelDbfs: number | null = null;
  for (let index = rising.length - 1; index >= 0; index--) {
    const step = rising[index];
    if (step.stimulusDbfs > reference.stimulusDbfs) continue;
    const found = deviations.find((deviation) => deviation.step === step);
    if (found === undefined) return { levelDbfs, isByNoise: true };
    if (Math.abs(found.deviationDb) > LINEAR_DB) {
      return { levelDbfs, isByNoise: 2 * found.standardDb > Math.abs(found.deviationDb) - LINEAR_DB };
    }
    levelDbfs = step.stimulusDbfs;
  }
  return { levelDbfs, isByNoise: false };
}

function stepTraces(rising: readonly LevelStep[], deviations: readonly Deviation[]): Record<string, Trace> {
  const trace = (yUnit: string, points: readonly (readonly [number, number])[]): Trace => {
    const finite = points.filter(([, y]) => Number.isFinite(y));
    return {
      xUnit: 'dBFS',
      yUnit,
      x: Float64Array.from(finite, ([x]) => x),
      y: Float64Array.from(finite, ([, y]) => y),
    };
  };
  const known = deviations.map(({ step }) => step);
  const overTone = (power: (step: Deviation['step']) => number | undefined | null) =>
    known.flatMap((step): [number, number][] => {
      const value = power(step);
      return value === undefined || value === null ? [] : [[step.stimulusDbfs, powerToDb(value / step.tone)]];
    });
  const orders = Array.from({ length: HIGHEST_TRACED_HARMONIC - 1 }, (_, index) => index + 2);
  const extremes = known.filter(({ extremes: found }) => found !== null);
  return {
    measuredLevel: trace(
      'dBFS',
      known.map((step) => [step.stimulusDbfs, meanSquareToDbfs(step.tone)]),
    ),
    deviation: trace(
      'dB',
      deviations.map(({ step, deviationDb }) => [step.stimulusDbfs, deviationDb]),
    ),
    thd: trace(
      'dB',
      overTone((step) => step.harmonics),
    ),
    thdPlusNoise: trace(
      'dB',
      known.map((step) => [step.stimulusDbfs, powerToDb(step.residual / (step.tone + step.residual))]),
    ),
    residual: trace(
      'dBFS',
      rising.map((step) => [step.stimulusDbfs, meanSquareToDbfs(step.residual)]),
    ),
    noise: trace(
      'dBFS',
      rising.map((step) => [step.stimulusDbfs, meanSquareToDbfs(step.noise)]),
    ),
    ...Object.fromEntries(
      orders.map((order) => [
        `harmonic${order}`,
        trace(
          'dB',
          overTone((step) => step.orders.get(order)),
        ),
      ]),
    ),
    positivePeak: trace(
      'dBFS',
      extremes.map((step) => [step.stimulusDbfs, ratioToDb(step.extremes?.positive ?? 0)]),
    ),
    negativePeak: trace(
      'dBFS',
      extremes.map((step) => [step.stimulusDbfs, ratioToDb(-(step.extremes?.negative ?? 0))]),
    ),
  };
}
