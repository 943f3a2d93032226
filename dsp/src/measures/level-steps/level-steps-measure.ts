import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, RecordBody, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { emptyChannel } from '../shared/finish-channel.js';
import { selectByName } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { stimulusMatch } from '../shared/scan-tones.js';
import { settleBand, settleHighestHarmonic } from '../shared/settings-band.js';
import { STEP_WINDOW } from '../shared/steps/create-step-reader.js';
import { placeSteps } from '../shared/steps/place-steps.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { combineAll } from '../shared/combine-all.js';
import { readLevelSteps, type LevelStep } from './read-steps.js';
import { STEP_FIGURES, stepResult, type StepResult } from './step-figures.js';

/** One tone at many levels: whether the output follows, and what is added on the way. */
export const levelStepsMeasure: Measure = {
  id: 'level-steps',
  title: 'Level steps',
  analyse: analyseLevelSteps,
};

const ASSUMED = 'level-steps';
const USUAL_HZ = 997;
const MARKS_SHARE = 0.3;

async function analyseLevelSteps(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const highestHarmonic = settleHighestHarmonic(settings);
  const selected = selectByName(source, settings);
  const aligned = await alignStimulus(source, context, { measure: ASSUMED, assumedName: ASSUMED }, (share) =>
    progress(share * MARKS_SHARE),
  );
  const placed = await placeSteps(
    selected.source,
    aligned,
    { measure: ASSUMED, assumedName: ASSUMED, followHz: aligned.frequencyHz },
    context,
  );
  if (placed.steps.length === 0) throw nothingMeasurable('the recording holds no whole step');
  const { channels, frequencyHz } = await readLevelSteps(
    selected.source,
    placed.steps,
    placed.frequencyHz ?? USUAL_HZ,
    band,
    highestHarmonic,
    context,
    (share) => progress(MARKS_SHARE + share * (1 - MARKS_SHARE)),
  );
  if (channels.every((steps) => steps === null)) throw nothingMeasurable('no step holds a tone');
  const results = channels.map((steps, index) =>
    steps === null ? null : stepResult(selected.names[index], steps),
  );
  const finished = results.map((result, index) =>
    result === null
      ? emptyChannel(selected.names[index], STEP_FIGURES, 'tone-missing')
      : finishSteps(selected.names[index], channels[index] ?? [], result),
  );
  const from = Math.min(...placed.steps.map(({ range }) => range.from));
  const to = Math.max(...placed.steps.map(({ range }) => range.to));
  const shortest = Math.min(...placed.steps.map(({ range }) => range.to - range.from));
  return assembleRecord(source, settings, context, {
    measure: ASSUMED,
    range: { from, to },
    windowName: STEP_WINDOW,
    fftLength: planFrames(shortest).fftLength,
    averages: planFrames(shortest).starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: referenceOf(aligned, placed.isAssumed, results),
    stimulus: stimulusMatch(aligned, frequencyHz),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...band.warnings,
      ...placed.warnings,
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

function nothingMeasurable(what: string): DspInputError {
  return new DspInputError('NOTHING_MEASURABLE', what, {
    remedy: 'Check that the right file was recorded, from before its first sound to after its last.',
  });
}

function finishSteps(channel: string, steps: readonly LevelStep[], result: StepResult) {
  const overloaded = steps.filter((step) => step.isOverloaded);
  const runs = overloaded.reduce((sum, { clippedRunCount }) => sum + clippedRunCount, 0);
  const warnings: Warning[] = [
    ...(overloaded.length > 0 ? [makeWarning('recording-overloaded', { runs }, { channel })] : []),
    ...result.warnings,
  ];
  return {
    result: {
      channel,
      figures: result.figures,
      limits: result.limits,
      uncertainty: combineAll(result.components),
      harmonics: [],
      components: [],
      traces: result.traces,
    },
    warnings,
  };
}

/** Only levels that are known to have been played say where the unit's full scale lies. */
function referenceOf(
  aligned: AlignedStimulus,
  isAssumed: boolean,
  results: readonly (StepResult | null)[],
): RecordBody['reference'] {
  const first = results.find((result) => result !== null)?.fullScaleDbfs ?? null;
  if (isAssumed || !aligned.isLevelKnown || first === null) return { unitFullScaleDbfs: null, from: null };
  return { unitFullScaleDbfs: first, from: aligned.recognisedBy };
}
