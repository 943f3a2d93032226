import { DspInputError } from '../../errors.js';
import { meanSquareToDbfs, powerToDb } from '../../level/decibel.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, Warning } from '../../record/record.js';
import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, partNumber } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { combineAll } from '../shared/combine-all.js';
import { isOverloaded } from '../shared/describe-recording.js';
import { emptyChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { bareLimit } from '../shared/limits.js';
import { selectByName } from '../shared/open-analysis.js';
import { planFrames } from '../shared/plan-frames.js';
import { createProgress } from '../shared/progress.js';
import { stimulusMatch } from '../shared/scan-tones.js';
import { settleBand, settleHighestHarmonic, shortNumber } from '../shared/settings-band.js';
import { spectrumTrace } from '../shared/spectrum-trace.js';
import { createStepReader, STEP_WINDOW, type StepReading } from '../shared/steps/create-step-reader.js';
import { placeSteps, type PlacedStep } from '../shared/steps/place-steps.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { powerDeviationDb } from '../shared/uncertainty.js';
import { takeApart, type Distortion } from '../tone/distortion.js';

/** A tone whose wave goes beyond its samples: whether a converter has room for it. */
export const intersampleMeasure: Measure = {
  id: 'intersample',
  title: 'Peaks between samples',
  analyse: analyseIntersample,
};

const INTERSAMPLE_FIGURES = ['levelErrorDb', 'thdDb', 'highToneLevelDbfs', 'lowToneLevelDbfs'];
const MARKS_SHARE = 0.4;
/** Share of the recorder's rate up to which harmonics count. */
const USABLE_SHARE = 0.45;

interface TakenStep {
  readonly step: PlacedStep;
  readonly reading: StepReading;
  readonly parts: Distortion | null;
}

async function analyseIntersample(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const band = settleBand(settings, source.sampleRateHz, null);
  const highestHarmonic = settleHighestHarmonic(settings);
  const selected = selectByName(source, settings);
  const aligned = await alignStimulus(
    source,
    context,
    { measure: 'intersample', assumedName: 'intersample-tone' },
    (share) => progress(share * MARKS_SHARE),
  );
  const known = aligned.parts.at(0) ?? aligned.file?.parts.find(({ measure }) => measure === 'intersample');
  const nominalHz = known === undefined ? null : partNumber(known, 'frequencyHz');
  const placed = await placeSteps(
    selected.source,
    aligned,
    { measure: 'intersample', assumedName: 'intersample-tone', followHz: nominalHz },
    context,
  );
  const falling = [...placed.steps].sort((one, other) => other.levelDbfs - one.levelDbfs);
  if (falling.length < 2 || placed.frequencyHz === null) {
    throw new DspInputError('NOTHING_MEASURABLE', 'the recording doesn’t hold both levels of the tone', {
      remedy: 'Record the stimulus from before its first sound to after its last.',
    });
  }
  const reader = createStepReader(source.sampleRateHz, context.capture);
  const usable = { lowHz: band.lowHz, highHz: USABLE_SHARE * source.sampleRateHz };
  const channels: [TakenStep, TakenStep][] = [];
  for (const step of [falling[0], falling[falling.length - 1]]) {
    const block = await selected.source.read(step.range.from, step.range.to - step.range.from);
    block.forEach((samples, channel) => {
      const reading = reader.read(samples, placed.frequencyHz);
      const parts =
        reading.tone === null ? null : takeApart(reading.spectrum, reading.tone, usable, highestHarmonic);
      const taken = { step, reading, parts };
      channels[channel] = [channels.at(channel)?.[0] ?? taken, taken];
    });
  }
  progress(1);
  if (channels.every(([high]) => high.parts === null)) {
    throw new DspInputError(
      'NOTHING_MEASURABLE',
      'the recording holds no tone that stands out of its noise',
      {
        remedy: 'Check the cables and the recorder’s input, and record again.',
      },
    );
  }
  const finished = channels.map((steps, index) => finishChannelOf(selected.names[index], steps, context));
  const firstHz = channels.find(([high]) => high.parts !== null)?.[0].parts?.frequencyHz ?? null;
  const shortest = planFrames(Math.min(...falling.map(({ range }) => range.to - range.from)));
  return assembleRecord(source, settings, context, {
    measure: 'intersample',
    range: {
      from: Math.min(...placed.steps.map(({ range }) => range.from)),
      to: Math.max(...placed.steps.map(({ range }) => range.to)),
    },
    windowName: STEP_WINDOW,
    fftLength: shortest.fftLength,
    averages: shortest.starts.length,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic,
    reference: { unitFullScaleDbfs: null, from: null },
    stimulus: stimulusMatch({ ...aligned, frequencyHz: nominalHz }, firstHz),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...placed.warnings,
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

/** Four samples a period leave no run of end codes: some of them alone say that the recorder cut the tone off. */
const END_CODES = 3;

function isCutOff({ level, tone }: StepReading, capture: CaptureFacts): boolean {
  return level.endCodeCount >= END_CODES || isOverloaded({ level, tone }, capture);
}

function finishChannelOf(
  channel: string,
  [high, low]: readonly [TakenStep, TakenStep],
  { capture }: AnalysisContext,
): FinishedChannel {
  if (high.parts === null || low.parts === null) {
    const isSilent = high.reading.level.samplePeak === 0;
    return emptyChannel(channel, INTERSAMPLE_FIGURES, isSilent ? 'channel-silent' : 'tone-missing');
  }
  const [highDb, lowDb] = [high.parts, low.parts].map(({ fundamental }) => meanSquareToDbfs(fundamental));
  const playedDb = high.step.levelDbfs - low.step.levelDbfs;
  const { harmonicPower, harmonicBound, fundamental, harmonics } = high.parts;
  const deviations = [high.parts, low.parts].map((parts) =>
    powerDeviationDb(parts.fundamental, parts.fundamentalVariance),
  );
  const warnings: Warning[] = [];
  if (isCutOff(high.reading, capture)) {
    const { endCodeCount } = high.reading.level;
    warnings.push(makeWarning('recording-overloaded', { runs: endCodeCount }, { channel }));
  }
  const about = { channel, figures: ['thdDb'] };
  if (harmonics.length === 0) {
    const values = { frequency: shortNumber(high.parts.frequencyHz) };
    warnings.push(makeWarning('no-harmonics-in-band', values, about));
  } else if (harmonicPower === null) {
    const below = powerToDb(harmonicBound / fundamental).toFixed(1);
    warnings.push(makeWarning('harmonics-in-noise', { below }, about));
  }
  return {
    result: {
      channel,
      figures: {
        levelErrorDb: highDb - lowDb - playedDb,
        thdDb: harmonicPower === null ? null : powerToDb(harmonicPower / fundamental),
        highToneLevelDbfs: highDb,
        lowToneLevelDbfs: lowDb,
      },
      limits:
        harmonicPower === null && harmonics.length > 0 && harmonicBound > 0
          ? { thdDb: bareLimit('noise', powerToDb(harmonicBound / fundamental)) }
          : {},
      uncertainty: combineAll({
        levelErrorDb: deviations.map((value, index) => ({ name: index === 0 ? 'high' : 'low', value })),
        highToneLevelDbfs: [{ name: 'estimate', value: deviations[0] }],
        lowToneLevelDbfs: [{ name: 'estimate', value: deviations[1] }],
      }),
      harmonics,
      components: [],
      traces: {
        spectrum: spectrumTrace(high.reading.spectrum),
        spectrumLower: spectrumTrace(low.reading.spectrum),
      },
    },
    warnings,
  };
}
