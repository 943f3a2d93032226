import { DSP_VERSION } from '../../record/dsp-version.js';
import { embedBaseline } from '../../record/embed-baseline.js';
import {
  RECORD_SCHEMA,
  type BenchRecord,
  type Between,
  type ChannelResult,
  type MeasureId,
  type RecordBody,
  type StimulusMatch,
  type Warning,
} from '../../record/record.js';
import type { SampleSource } from '../../source/sample-source.js';
import type { AnalysisContext, AnalysisSettings } from '../measure.js';
import type { FrameRange } from './stream-frames.js';

export interface RecordParts {
  readonly measure: MeasureId;
  readonly range: FrameRange;
  readonly windowName: string;
  readonly fftLength: number;
  readonly averages: number;
  readonly bandLowHz: number;
  readonly bandHighHz: number;
  readonly highestHarmonic: number;
  readonly reference: RecordBody['reference'];
  readonly stimulus: StimulusMatch | null;
  readonly channels: readonly ChannelResult[];
  /** What lies between channels, or is of the whole file; nothing unless given. */
  readonly between?: Between;
  /** A programme's parts. */
  readonly segments?: readonly RecordBody[];
  readonly warnings: readonly Warning[];
}

/** Puts a record together from its parts, in the contract's order, with all that was used to make it. */
export function assembleRecord(
  source: SampleSource,
  settings: AnalysisSettings,
  context: AnalysisContext,
  parts: RecordParts,
): BenchRecord {
  const {
    sha256,
    sampleRateHz,
    channelCount,
    bitsPerSample,
    sampleFormat,
    frameCount,
    durationS,
    isPractice,
  } = context.capture;
  return {
    schema: RECORD_SCHEMA,
    dspVersion: DSP_VERSION,
    capture: {
      sha256,
      sampleRateHz,
      channelCount,
      bitsPerSample,
      sampleFormat,
      frameCount,
      durationS,
      ...(isPractice === true ? { isPractice } : {}),
    },
    measure: parts.measure,
    settings: {
      fromS: parts.range.from / source.sampleRateHz,
      toS: parts.range.to / source.sampleRateHz,
      window: parts.windowName,
      fftLength: parts.fftLength,
      averages: parts.averages,
      bandLowHz: parts.bandLowHz,
      bandHighHz: parts.bandHighHz,
      highestHarmonic: parts.highestHarmonic,
      channel: settings.channel ?? 'all',
      descriptor: context.descriptor ?? null,
      calibration: settings.calibration ?? null,
      baseline: settings.baseline ? embedBaseline(settings.baseline) : null,
    },
    reference: parts.reference,
    stimulus: parts.stimulus,
    channels: parts.channels,
    between: parts.between ?? { figures: {}, traces: {} },
    findings: [],
    warnings: [...(context.fileWarnings ?? []), ...parts.warnings],
    segments: parts.segments ?? [],
  };
}
