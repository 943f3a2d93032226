import { DspInputError } from '../../errors.js';
import { createLevelMeter, type LevelReading } from '../../level/create-level-meter.js';
import { makeWarning } from '../../record/make-warning.js';
import type { BenchRecord, FigureLimit, RecordBody, StimulusMatch, Warning } from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import { sweepDurationS, type SweepSignal } from '../../stimulus/sweep-signal.js';
import type { AnalysisContext, AnalysisSettings, Measure } from '../measure.js';
import { alignStimulus, partNumber, type AlignedStimulus } from '../shared/align-stimulus.js';
import { assembleRecord } from '../shared/assemble-record.js';
import { isOverloaded } from '../shared/describe-recording.js';
import {
  AFTER_SWEEP_S,
  BEFORE_SWEEP_S,
  createDeconvolver,
} from '../shared/deconvolution/create-deconvolver.js';
import { emptyChannel, type FinishedChannel } from '../shared/finish-channel.js';
import { bareLimit } from '../shared/limits.js';
import { selectByName } from '../shared/open-analysis.js';
import { createProgress } from '../shared/progress.js';
import { settleBand, settleHighestHarmonic, shortNumber } from '../shared/settings-band.js';
import { cutWarnings } from '../shared/stimulus-knowledge.js';
import { throwIfCancelled } from '../shared/stream-frames.js';
import { measureResponse, SWEEP_FIGURES, type MeasuredResponse } from './measure-response.js';
import { placeSweep, type PlacedSweep } from './place-sweep.js';

/** A tone that rises through all frequencies: response, phase, impulse, and harmonics against frequency. */
export const sweepMeasure: Measure = { id: 'sweep', title: 'Sweep', analyse: analyseSweep };

const MARKS_SHARE = 0.3;
/** Share of the lower rate up to which a response counts. */
const USABLE_SHARE = 0.45;
/** A channel this far below the other isn't the sweep's. */
const ABSENT_DB = -60;

async function analyseSweep(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
): Promise<BenchRecord> {
  const progress = createProgress(context.onProgress);
  const selected = selectByName(source, settings);
  if (source.frameCount === 0) throw new DspInputError('EMPTY_SIGNAL', 'the recording holds no samples');
  const band = settleBand(settings, source.sampleRateHz, null);
  const aligned = await alignStimulus(source, context, { measure: 'sweep', assumedName: 'sweep' }, (share) =>
    progress(share * MARKS_SHARE),
  );
  const placed = await placeSweep(selected.source, aligned, context);
  const { sampleRateHz } = source;
  const range = rangeOf(selected.source, placed);
  const deconvolver = createDeconvolver({
    sweep: placed.sweep,
    speed: placed.speed,
    sampleRateHz,
    leadS: placed.fromS - range.from / sampleRateHz,
    frameCount: range.to - range.from,
  });
  const usable = USABLE_SHARE * Math.min(sampleRateHz, aligned.file?.sampleRateHz ?? Infinity);
  const responses: (MeasuredResponse | null)[] = [];
  const levels: LevelReading[] = [];
  const { sampleFormat, bitsPerSample } = context.capture;
  for (const [index] of selected.names.entries()) {
    throwIfCancelled(context);
    const samples = (await selected.source.read(range.from, range.to - range.from))[index];
    const meter = createLevelMeter(sampleFormat === 'integer' ? { integerBits: bitsPerSample } : {});
    meter.push(samples);
    levels.push(meter.read());
    const options = {
      ...placed,
      lowHz: deconvolver.lowHz,
      highHz: deconvolver.highHz,
      bandLowHz: band.lowHz,
      bandHighHz: Math.min(band.highHz, usable),
    };
    responses.push(measureResponse(deconvolver.deconvolve(samples), options));
    progress(MARKS_SHARE + ((index + 1) / selected.names.length) * (1 - MARKS_SHARE));
  }
  const loudest = Math.max(...responses.map((response) => response?.gainDb ?? -Infinity));
  if (!Number.isFinite(loudest)) {
    throw new DspInputError('NOTHING_MEASURABLE', 'no channel holds the sweep', {
      remedy: 'Check the cables and the recorder’s input, and record again.',
    });
  }
  const present = responses.map((response) =>
    response !== null && response.gainDb >= loudest + ABSENT_DB ? response : null,
  );
  const missing = missingBand(selected.source, placed);
  const finished = present.map((response, index) =>
    finishSweep(selected.names[index], response, levels[index], context),
  );
  const first = present.find((response) => response !== null);
  return assembleRecord(source, settings, context, {
    measure: 'sweep',
    range,
    windowName: 'cosine-tapered',
    fftLength: 2 ** Math.ceil(Math.log2(range.to - range.from)),
    averages: 1,
    bandLowHz: band.lowHz,
    bandHighHz: band.highHz,
    highestHarmonic: settleHighestHarmonic(settings),
    reference: referenceOf(aligned, placed, first ?? null),
    stimulus: matchOf(aligned, placed, first?.arrival.isInverted ?? null),
    channels: finished.map(({ result }) => result),
    warnings: [
      ...cutWarnings(aligned, context),
      ...band.warnings,
      ...placed.warnings,
      ...(missing === null ? [] : [makeWarning('sweep-cut', { missing })]),
      ...(placed.isClockKnown ? [] : [makeWarning('clock-unknown')]),
      ...finished.flatMap(({ warnings }) => warnings),
    ],
  });
}

/** The output at 1 kHz for 0 dBFS, where the sweep's level is known to have been played. */
function referenceOf(
  aligned: AlignedStimulus,
  placed: PlacedSweep,
  first: MeasuredResponse | null,
): RecordBody['reference'] {
  const part = aligned.file?.parts.find(({ measure }) => measure === 'sweep');
  const levelDbfs =
    part === undefined || placed.isAssumed || !aligned.isLevelKnown ? null : partNumber(part, 'levelDbfs');
  return first === null || levelDbfs === null
    ? { unitFullScaleDbfs: null, from: null }
    : { unitFullScaleDbfs: first.gainDb - levelDbfs, from: aligned.recognisedBy };
}

function rangeOf(source: SampleSource, { sweep, fromS, speed }: PlacedSweep) {
  const { sampleRateHz, frameCount } = source;
  const endS = fromS + sweepDurationS(sweep) / speed + AFTER_SWEEP_S;
  const from = Math.min(frameCount, Math.max(0, Math.round((fromS - BEFORE_SWEEP_S) * sampleRateHz)));
  return { from, to: Math.max(from, Math.min(frameCount, Math.round(endS * sampleRateHz))) };
}

/** What of the sweep the recording doesn't hold, in words; null when it is whole. */
function missingBand(source: SampleSource, { sweep, fromS, speed }: PlacedSweep): string | null {
  const endS = fromS + sweepDurationS(sweep) / speed;
  const durationS = source.frameCount / source.sampleRateHz;
  const frequencyAt = (atS: number, signal: SweepSignal): string =>
    shortNumber(Number((signal.lowHz * Math.exp(((atS - fromS) * speed) / signal.rateS)).toPrecision(3)));
  if (fromS < 0) return `below ${frequencyAt(0, sweep)} Hz`;
  return endS > durationS ? `above ${frequencyAt(durationS, sweep)} Hz` : null;
}

function finishSweep(
  channel: string,
  response: MeasuredResponse | null,
  level: LevelReading,
  { capture }: AnalysisContext,
): FinishedChannel {
  if (response === null) {
    return emptyChannel(channel, SWEEP_FIGURES, level.samplePeak === 0 ? 'channel-silent' : 'tone-missing');
  }
  const { figures, uncertainty, traces } = response;
  const open = (['minus3DbLowHz', 'minus3DbHighHz'] as const).filter((key) => figures[key] === null);
  const isClipped = isOverloaded({ level, tone: { frequencyHz: 20 } }, capture);
  const limits: Record<string, FigureLimit> = isClipped
    ? Object.fromEntries(SWEEP_FIGURES.map((key) => [key, bareLimit('overload')]))
    : {};
  const warnings: Warning[] = [
    ...(isClipped ? [makeWarning('recording-overloaded', { runs: level.clippedRunCount }, { channel })] : []),
    ...(open.length > 0 ? [makeWarning('no-half-power-point', { channel }, { channel, figures: open })] : []),
  ];
  return {
    result: { channel, figures, limits, uncertainty, harmonics: [], components: [], traces },
    warnings,
  };
}

function matchOf(aligned: AlignedStimulus, placed: PlacedSweep, isInverted: boolean | null): StimulusMatch {
  const polarity = isInverted === null ? aligned.polarity : isInverted ? 'inverted' : 'same';
  const { name, recognisedBy } = aligned;
  const clockOffsetPpm = aligned.clockOffsetPpm ?? (placed.isClockKnown ? (placed.speed - 1) * 1e6 : null);
  const part = aligned.file?.parts.find(({ measure }) => measure === 'sweep');
  const fileFromS = placed.isAssumed ? 0 : (part?.fromS ?? 0);
  const delayS = aligned.delayS ?? placed.fromS - fileFromS / placed.speed;
  return { name, recognisedBy, delayS, clockOffsetPpm, polarity };
}
