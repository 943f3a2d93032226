import { DspInputError } from '../../errors.js';
import { makeWarning } from '../../record/make-warning.js';
import type { StimulusMatch, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { exclusionHalfWidthBins } from '../../window/create-window.js';
import type { WindowName } from '../../window/window-coefficients.js';
import type { AnalysisContext, AnalysisSettings } from '../measure.js';
import { lookForTones } from './look-for-tone.js';
import { selectByName, settleSegment, type SelectedChannels } from './open-analysis.js';
import { planFrames, type FramePlan } from './plan-frames.js';
import { createProgress } from './progress.js';
import { scanSegment, type ChannelScan } from './scan-segment.js';
import { shortNumber } from './settings-band.js';
import { cutWarnings, gatherStimulus, type StimulusKnowledge } from './stimulus-knowledge.js';
import type { FrameRange } from './stream-frames.js';
import type { ToneSearch } from './tone-tracker.js';

/** Windows by falling reach and rising width: the first whose lobe fits under the tone's frequency is taken. */
const WINDOWS: readonly WindowName[] = ['blackman-harris-7', 'blackman-harris-4', 'hann'];
/** A lobe's half-width stays under a quarter of the tone's frequency … */
const COMFORTABLE = 4;
/** … or at least lobes of neighbouring harmonics don't overlap. */
const BEARABLE = 2;
const NEAR_NOMINAL = 0.02;
/** Share of the work that finding the segment takes, when levels must tell. */
const SURVEY_SHARE = 0.15;
/** … and the search for marks before it. */
const MARKS_SHARE = 0.25;

export interface ToneScan {
  readonly selected: SelectedChannels;
  readonly range: FrameRange;
  readonly plan: FramePlan;
  readonly windowName: WindowName;
  readonly channels: readonly ChannelScan[];
  readonly knowledge: StimulusKnowledge;
  readonly isTooShort: boolean;
  readonly warnings: readonly Warning[];
}

export interface ToneScanOptions {
  /** What the recording is taken for when neither marks nor a descriptor say. */
  readonly assumedStimulus: string;
  /** Where the tone is looked for first when its frequency isn't known; null for anywhere. */
  readonly preferred: ToneSearch | null;
}

/**
 * Finds the segment with a steady tone and scans it.
 *
 * @throws DspInputError `NOTHING_MEASURABLE` when no channel holds a tone; `SEGMENT_TOO_SHORT` when the segment is too
 *   short to tell a tone so low from its harmonics; `CANCELLED`; whatever reading throws
 */
export async function scanTones(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
  options: ToneScanOptions,
): Promise<ToneScan> {
  const progress = createProgress(context.onProgress);
  const selected = selectByName(source, settings);
  const knowledge = await gatherStimulus(source, context, options.assumedStimulus, (share) =>
    progress(share * MARKS_SHARE),
  );
  const range = await settleSegment(selected.source, settings, knowledge.part, false, context, (share) => {
    progress(MARKS_SHARE + share * SURVEY_SHARE);
  });
  const plan = planFrames(range.to - range.from);
  const nominalHz = knowledge.frequencyHz;
  const preferred =
    nominalHz === null
      ? options.preferred
      : { lowHz: nominalHz * (1 - NEAR_NOMINAL), highHz: nominalHz * (1 + NEAR_NOMINAL) };
  const sights = await lookForTones(selected.source, range, plan, preferred);
  const lowestHz = Math.min(...sights.map((sight) => sight?.frequencyHz ?? Infinity));
  if (lowestHz === Infinity) throw nothingMeasurable();
  const choice = chooseWindow(lowestHz, source.sampleRateHz, plan.fftLength);
  const channels = await scanSegment(
    selected.source,
    selected.names,
    range,
    { plan, windowName: choice.windowName, searches: sights.map((sight) => sight?.search ?? null) },
    context,
    (share) => progress(MARKS_SHARE + SURVEY_SHARE + share * (1 - MARKS_SHARE - SURVEY_SHARE)),
  );
  if (channels.every(({ tone }) => tone === null)) throw nothingMeasurable();
  return {
    selected,
    range,
    plan,
    windowName: choice.windowName,
    channels,
    knowledge,
    isTooShort: choice.isTooShort,
    warnings: [
      ...cutWarnings(knowledge, context),
      ...(choice.isTooShort
        ? [tooShortWarning(lowestHz, source.sampleRateHz, range, choice.windowName, plan)]
        : []),
      ...mismatchWarnings(knowledge, lowestHz),
    ],
  };
}

function nothingMeasurable(): DspInputError {
  return new DspInputError('NOTHING_MEASURABLE', 'the recording holds no tone that stands out of its noise', {
    remedy: 'Check that the right file was recorded, or measure it as silence (idle).',
  });
}

function chooseWindow(
  frequencyHz: number,
  sampleRateHz: number,
  fftLength: number,
): { windowName: WindowName; isTooShort: boolean } {
  const bins = (frequencyHz * fftLength) / sampleRateHz;
  const windowName = WINDOWS.find((name) => bins >= BEARABLE * exclusionHalfWidthBins(name));
  if (windowName === undefined) {
    throw new DspInputError(
      'SEGMENT_TOO_SHORT',
      `the segment holds too few periods of a tone of ${shortNumber(frequencyHz)} Hz to tell it from its harmonics`,
      { remedy: 'Record a longer stretch of the tone.' },
    );
  }
  return { windowName, isTooShort: bins < COMFORTABLE * exclusionHalfWidthBins('blackman-harris-7') };
}

function tooShortWarning(
  frequencyHz: number,
  sampleRateHz: number,
  range: FrameRange,
  windowName: WindowName,
  plan: FramePlan,
): Warning {
  const needed = (COMFORTABLE * exclusionHalfWidthBins('blackman-harris-7') * sampleRateHz) / frequencyHz;
  return makeWarning('too-short', {
    duration: shortNumber((range.to - range.from) / sampleRateHz),
    frequency: shortNumber(frequencyHz),
    resolution: shortNumber((2 * exclusionHalfWidthBins(windowName) * sampleRateHz) / plan.fftLength),
    wanted: shortNumber(2 ** Math.ceil(Math.log2(needed)) / sampleRateHz),
  });
}

function mismatchWarnings(knowledge: StimulusKnowledge, foundHz: number): Warning[] {
  const nominalHz = knowledge.frequencyHz;
  if (nominalHz === null || Math.abs(foundHz / nominalHz - 1) <= NEAR_NOMINAL) return [];
  return [
    makeWarning('stimulus-mismatch', {
      declared: `a tone of ${shortNumber(nominalHz)} Hz`,
      found: `one of ${shortNumber(foundHz)} Hz`,
    }),
  ];
}

/** The record's account of the stimulus, with the clocks' offset where the tone's true frequency is known. */
export function stimulusMatch(knowledge: StimulusKnowledge, measuredHz: number | null): StimulusMatch {
  const { name, recognisedBy, delayS, polarity, frequencyHz } = knowledge;
  const isSame =
    measuredHz !== null && frequencyHz !== null && Math.abs(measuredHz / frequencyHz - 1) <= NEAR_NOMINAL;
  // A tone tells the clocks' offset better than the few milliseconds between marks.
  const clockOffsetPpm = isSame ? (measuredHz / frequencyHz - 1) * 1e6 : knowledge.clockOffsetPpm;
  return { name, recognisedBy, delayS, clockOffsetPpm, polarity };
}
