import { DspInputError } from '../../errors.js';
import { channelName } from '../../source/channel-name.js';
import type { SampleSource } from '../../source/sample-source.js';
import { selectChannels } from '../../source/select-channels.js';
import type { AnalysisContext, AnalysisSettings } from '../measure.js';
import { SHORTEST_FFT } from './plan-frames.js';
import { findSteadyPart, onGrid } from './steady-part.js';
import type { FrameRange } from './stream-frames.js';

/** Channels of one file that are still told apart by ear and eye; more is no recording of a unit. */
const CHANNELS_AT_MOST = 32;

export interface SelectedChannels {
  readonly source: SampleSource;
  readonly names: readonly string[];
}

/**
 * Takes the channels that the settings ask for.
 *
 * @throws DspInputError `BAD_ARGUMENT` for a channel the capture hasn't
 */
export function selectByName(source: SampleSource, settings: AnalysisSettings): SelectedChannels {
  const all = Array.from({ length: Math.min(source.channelCount, CHANNELS_AT_MOST) }, (_, index) => index);
  const wanted = settings.channel ?? 'all';
  const indices = wanted === 'all' ? all : all.filter((index) => channelName(index) === wanted);
  if (indices.length === 0) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `the recording has no channel "${wanted}": it has ${source.channelCount}`,
    );
  }
  return { source: selectChannels(source, indices), names: indices.map(channelName) };
}

/** Where in the capture to measure, when something better than its levels says so; seconds. */
export interface KnownPart {
  readonly fromS: number;
  readonly toS: number;
}

/**
 * Settles the segment to be measured: as asked for, else as the stimulus says, else the steady part by level.
 *
 * @param known - from marks; null without
 * @param wholeFile - true for a measure of silence, where the file as a whole counts
 * @throws DspInputError `BAD_ARGUMENT` for times that aren't in the capture; `SEGMENT_TOO_SHORT` below 512 samples;
 *   `EMPTY_SIGNAL` without samples
 */
export async function settleSegment(
  source: SampleSource,
  settings: AnalysisSettings,
  known: KnownPart | null,
  wholeFile: boolean,
  context: AnalysisContext,
  onShare: (share: number) => void,
): Promise<FrameRange> {
  const { frameCount, sampleRateHz } = source;
  if (frameCount === 0) throw new DspInputError('EMPTY_SIGNAL', 'the recording holds no samples');
  const isAsked = settings.fromS !== undefined || settings.toS !== undefined;
  const range = isAsked
    ? askedRange(source, settings)
    : known !== null
      ? {
          from: Math.max(0, onGrid(known.fromS * sampleRateHz, sampleRateHz)),
          to: Math.min(frameCount, onGrid(known.toS * sampleRateHz, sampleRateHz)),
        }
      : wholeFile
        ? { from: 0, to: frameCount }
        : await findSteadyPart(source, context, onShare);
  const length = range.to - range.from;
  if (length < SHORTEST_FFT) {
    throw new DspInputError(
      'SEGMENT_TOO_SHORT',
      `the segment holds ${Math.max(0, length)} samples, and ${SHORTEST_FFT} at least are needed`,
      { remedy: 'Record a few seconds, or choose a longer segment.' },
    );
  }
  return range;
}

function askedRange(source: SampleSource, settings: AnalysisSettings): FrameRange {
  const durationS = source.frameCount / source.sampleRateHz;
  const fromS = settings.fromS ?? 0;
  const toS = settings.toS ?? durationS;
  // An end given in rounded seconds may lie a rounding past the last frame.
  const latestS = durationS * (1 + 1e-8) + 1 / source.sampleRateHz;
  if (!(fromS >= 0 && fromS < toS && toS <= latestS)) {
    throw new DspInputError(
      'BAD_ARGUMENT',
      `a segment from ${fromS} to ${toS} s isn't in a recording of ${durationS} s`,
    );
  }
  const isWholeEnd = toS >= durationS * (1 - 1e-8);
  const to = isWholeEnd ? source.frameCount : Math.round(toS * source.sampleRateHz);
  return { from: Math.min(to, Math.round(fromS * source.sampleRateHz)), to };
}
