import { DspInputError } from '../../errors.js';
import { meanSquareToDbfs, ratioToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Trace } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, partNumber, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { emptyChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { selectByName } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic, shortNumber } from '../shared/settings-band.js';
import { STEP_WINDOW } from '../shared/steps/create-step-reader.js';
import { placeSteps } from '../shared/steps/place-steps.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { highestProductHz } from '../shared/two-tone/pair-kind.js';
import type { ProductRatio } from '../shared/two-tone/pair-products.js';
import { readPairSteps, type PairStep, type PairStepChannel } from './read-pair-steps.js';

/** Two tones at many levels: from which level on they make more of each other. */
export const twoToneStepsMeasure: Measure = {
  id: 'two-tone-steps',
  title: 'Two tones against level',
  analyse: analyseTwoToneSteps,
};

const ID = 'two-tone-steps';
const ASSUMED = 'modulation-steps';
const MARKS_SHARE = 0.3;

async function analyseTwoToneSteps(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const selected = selectByName(source, settings);
  const aligned = await alignStimulus(source, context, { measure: ID, assumedName: ASSUMED }, (share) =>
    progress(share * MARKS_SHARE),
  );
  const known = knownTones(aligned);
  const placed = await placeSteps(
    selected.source,
    aligned,
    // The low tone's period may be longer than the blocks by which levels are followed.
    { measure: ID, assumedName: ASSUMED, followHz: known?.highHz ?? null },
    context,
  );
  const nothing = (what: string): DspInputError =>
    new DspInputError('NOTHING_MEASURABLE', what, { remedy: 'Check that the right file was recorded.' });
  if (placed.steps.length === 0) throw nothing('the recording holds no whole step');
  const channels = await readPairSteps(
    selected.source,
    placed.steps,
    {
      nominal: known,
      amplitudeRatio: known?.amplitudeRatio ?? null,
      highestHz: highestProductHz(source.sampleRateHz, aligned.file?.sampleRateHz ?? null),
    },
    context,
    (share) => progress(MARKS_SHARE + share * (1 - MARKS_SHARE)),
  );
  const first = channels.find((channel) => channel !== null);
  if (!first) throw nothing('no step holds two tones');
  const finished = channels.map((channel, index) => finishChannelOf(selected.names[index], channel));
  const shortest = planFrames(Math.min(...placed.steps.map(({ range }) => range.to - range.from)));
  return assembleRecord(source, settings, context, {
    measure: ID,
    range: {
      from: Math.min(...placed.steps.map(({ range }) => range.from)),
      to: Math.max(...placed.steps.map(({ range }) => range.to)),
    },
    windowName: STEP_WINDOW,
    fftLength: shortest.fftLength,
    averages: shortest.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: {
      name: placed.isAssumed ? `${first.pair.kind}-steps` : aligned.name,
      recognisedBy: aligned.recognisedBy,
      delayS: aligned.delayS,
      clockOffsetPpm:
        known === null ? aligned.clockOffsetPpm : (first.pair.highHz / known.nominalHighHz - 1) * 1e6,
      polarity: aligned.polarity,
    },
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...placed.warnings,
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

interface KnownTones {
  /** As they should lie in the recording. */
  readonly lowHz: number;
  readonly highHz: number;
  readonly nominalHighHz: number;
  readonly amplitudeRatio: number | null;
}

function knownTones({ parts, file, speed }: AlignedStimulus): KnownTones | null {
  const part = parts.at(0) ?? file?.parts.find(({ measure }) => measure === ID);
  if (part === undefined) return null;
  const low = partNumber(part, 'lowFrequencyHz');
  const high = partNumber(part, 'highFrequencyHz');
  if (low === null || high === null) return null;
  return {
    lowHz: low * speed,
    highHz: high * speed,
    nominalHighHz: high,
    amplitudeRatio: partNumber(part, 'amplitudeRatio'),
  };
}

function finishChannelOf(channel: string, found: PairStepChannel | null): FinishedChannel {
  if (found === null) return emptyChannel(channel, [], 'tone-missing');
  const rising = [...found.steps].sort((one, other) => one.stimulusDbfs - other.stimulusDbfs);
  const overloaded = rising.filter((step) => step.isOverloaded);
  const runs = overloaded.reduce((sum, { clippedRunCount }) => sum + clippedRunCount, 0);
  const traces = tracesOf(found.pair.kind, rising);
  const lost = Object.values(traces).some(({ x }) => x.length < rising.length);
  return {
    result: {
      channel,
      figures: {},
      limits: {},
      uncertainty: {},
      harmonics: [],
      components: [],
      traces,
    },
    warnings: [
      ...(overloaded.length > 0 ? [makeWarning('recording-overloaded', { runs }, { channel })] : []),
      ...(lost
        ? [
            makeWarning(
              'step-products-in-noise',
              { channel, below: shortNumber(floorOf(rising)) },
              { channel },
            ),
          ]
        : []),
    ],
  };
}

/** How far down the noise would hide a product in the loudest step, dB. */
function floorOf(rising: readonly PairStep[]): number {
  return Math.round(-ratioToDb(rising[rising.length - 1].parts.total.below));
}

function tracesOf(kind: 'modulation' | 'difference', rising: readonly PairStep[]): Record<string, Trace> {
  const trace = (yUnit: string, valueOf: (step: PairStep) => number | null): Trace => {
    const points = rising.flatMap((step): [number, number][] => {
      const value = valueOf(step);
      return value === null || !Number.isFinite(value) ? [] : [[step.stimulusDbfs, value]];
    });
    return {
      xUnit: 'dBFS',
      yUnit,
      x: Float64Array.from(points, ([x]) => x),
      y: Float64Array.from(points, ([, y]) => y),
    };
  };
  const ratio = (pick: (step: PairStep) => ProductRatio): Trace =>
    trace('dB', (step) => {
      const { ratio: value } = pick(step);
      return value === null ? null : ratioToDb(value);
    });
  const level = trace('dBFS', ({ parts }) => meanSquareToDbfs(parts.highPower));
  return kind === 'modulation'
    ? { modulationDistortion: ratio(({ parts }) => parts.total), highToneLevel: level }
    : {
        differenceD2: ratio(({ parts }) => parts.second),
        differenceD3: ratio(({ parts }) => parts.third),
        highToneLevel: level,
      };
}
