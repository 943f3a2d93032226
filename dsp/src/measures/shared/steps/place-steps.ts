import { DspInputError } from '../../../errors.js';
import { makeWarning } from '../../../record/make-warning.js';
import type { Warning } from '../../../record/record.js';
import type { SampleSource } from '../../../source/sample-source.js';
import { createStimulus } from '../../../stimulus/create-stimulus.js';
import type { StimulusStep } from '../../../stimulus/descriptor.js';
import type { AnalysisContext } from '../../measure.js';
import type { AlignedStimulus } from '../align-stimulus.js';
import type { FrameRange } from '../stream-frames.js';
import { shortNumber } from '../settings-band.js';
import { followLevel } from './follow-level.js';
import { matchLadder } from './match-ladder.js';

/** A step of the stimulus and where it lies in the recording. */
export interface PlacedStep {
  /** In the stimulus file. */
  readonly levelDbfs: number;
  readonly range: FrameRange;
}

export interface PlacedSteps {
  /** Those that the recording holds, in the order played. */
  readonly steps: readonly PlacedStep[];
  /** Nothing named the ladder: the usual one was assumed. */
  readonly isAssumed: boolean;
  /** The tone followed, as it lies in the recording; null where nothing says. */
  readonly frequencyHz: number | null;
  readonly warnings: readonly Warning[];
}

export interface StepSearch {
  readonly measure: 'level-steps' | 'two-tone-steps' | 'intersample';
  /** The stimulus whose ladder is assumed when nothing names one. */
  readonly assumedName: string;
  /** Tone by which a ladder is found without marks, Hz; null for the strongest. */
  readonly followHz: number | null;
}

/** Filters of player and recorder ring on after a step's rise; a quarter of a step at most. */
const SETTLING_S = 0.015;
/** Places that were found by level are known to some hundredths of a second. */
const ROUGH_SETTLING_S = 0.05;
const BEFORE_END_S = 0.005;
/** Lengths are kept to whole multiples of this, so that steps of one duration share a plan. */
const GRID_S = 0.005;

/**
 * Says where each step lies: by the marks, else by the ladder's own shape in the recording.
 *
 * @throws DspInputError `NOT_RECOGNISED` when the recording shows no such ladder
 */
export async function placeSteps(
  source: SampleSource,
  aligned: AlignedStimulus,
  search: StepSearch,
  context: Pick<AnalysisContext, 'signal'>,
): Promise<PlacedSteps> {
  const part = aligned.parts.find(({ measure }) => measure === search.measure);
  if (part !== undefined) {
    const whole = part.steps.filter(({ isWhole }) => isWhole);
    const cut = part.steps.filter(({ isWhole }) => !isWhole);
    return {
      steps: whole.map((step) => placeStep(source, step, SETTLING_S)),
      isAssumed: false,
      frequencyHz: search.followHz === null ? null : search.followHz * aligned.speed,
      warnings: cut.length === 0 ? [] : [missingSteps(cut.map(({ levelDbfs }) => levelDbfs))],
    };
  }
  const described = aligned.file?.parts.find(({ measure }) => measure === search.measure);
  const ladder = described?.steps ?? usualLadder(search.assumedName);
  const envelope = await followLevel(source, search.followHz, context);
  const delayS = envelope === null ? null : matchLadder(envelope, ladder);
  if (delayS === null) {
    throw new DspInputError('NOT_RECOGNISED', 'the recording holds no steps of level that fit the stimulus', {
      remedy: 'Give the stimulus’s descriptor, or record the file with its marks.',
    });
  }
  const durationS = source.frameCount / source.sampleRateHz;
  const laid = ladder.map((step) => ({ ...step, fromS: step.fromS + delayS, toS: step.toS + delayS }));
  const isThere = ({ fromS, toS }: StimulusStep): boolean => fromS >= 0 && toS <= durationS;
  const cut = laid.filter((step) => !isThere(step));
  const isAssumed = described === undefined;
  return {
    steps: laid.filter(isThere).map((step) => placeStep(source, step, ROUGH_SETTLING_S)),
    isAssumed,
    frequencyHz: envelope?.frequencyHz ?? null,
    warnings: [
      ...(isAssumed ? [makeWarning('stimulus-assumed', { name: search.assumedName })] : []),
      ...(cut.length === 0 ? [] : [missingSteps(cut.map(({ levelDbfs }) => levelDbfs))]),
    ],
  };
}

function usualLadder(name: string): readonly StimulusStep[] {
  const { parts } = createStimulus(name, { sampleRateHz: 48_000, bitsPerSample: 24 }).describe('');
  return parts[0].steps;
}

function missingSteps(levels: readonly number[]): Warning {
  return makeWarning('steps-missing', { levels: levels.map(shortNumber).join(', ') });
}

function placeStep(source: SampleSource, step: StimulusStep, settlingS: number): PlacedStep {
  const { sampleRateHz, frameCount } = source;
  const lengthS = step.toS - step.fromS;
  const settled = Math.min(settlingS, lengthS / 4);
  const before = settlingS === ROUGH_SETTLING_S ? settled : Math.min(BEFORE_END_S, lengthS / 8);
  const grid = Math.max(1, Math.round(GRID_S * sampleRateHz));
  const from = Math.min(frameCount, Math.max(0, Math.round((step.fromS + settled) * sampleRateHz)));
  const wanted = Math.floor(((lengthS - settled - before) * sampleRateHz) / grid) * grid;
  return { levelDbfs: step.levelDbfs, range: { from, to: Math.min(frameCount, from + wanted) } };
}
