import { createLevelMeter, type LevelReading } from '../../level/create-level-meter.js';
import { createTruePeakMeter } from '../../level/create-true-peak-meter.js';
import type { CaptureFacts, SampleSource } from '../../source/sample-source.js';
import type { PowerSpectrum } from '../../spectrum/power-spectrum.js';
import type { WindowName } from '../../window/window-coefficients.js';
import type { AnalysisContext } from '../measure.js';
import { createSpectrumAccumulator, createSpectrumKit } from './averaged-spectrum.js';
import type { FramePlan } from './plan-frames.js';
import { softenEnds } from './soften-ends.js';
import { streamFrames, type FrameRange } from './stream-frames.js';
import { createToneTracker, type ToneSearch, type ToneTrack } from './tone-tracker.js';

/** All that one pass over a segment tells of a channel. */
export interface ChannelScan {
  readonly channel: string;
  readonly level: LevelReading;
  /** Greatest magnitude between samples too, FS. */
  readonly truePeak: number;
  readonly spectrum: PowerSpectrum;
  /** DC offset, FS. */
  readonly constant: number;
  /** null where no tone was looked for or found. */
  readonly tone: ToneTrack | null;
  /** The low tone of a pair. */
  readonly lowTone: ToneTrack | null;
}

export interface ScanOptions {
  readonly plan: FramePlan;
  readonly windowName: WindowName;
  /** Where to look for each channel's tone; null where there is none. */
  readonly searches: readonly (ToneSearch | null)[];
  /** Where to look for each channel's low tone, of a pair; none without. */
  readonly lowSearches?: readonly (ToneSearch | null)[];
}

/**
 * Measures levels, spectrum and tone of every channel in one pass over a segment; memory doesn't grow with its length.
 *
 * @param source - the channels to be analysed
 * @param names - one a channel
 */
export async function scanSegment(
  source: SampleSource,
  names: readonly string[],
  range: FrameRange,
  options: ScanOptions,
  context: Pick<AnalysisContext, 'signal'> & { readonly capture: CaptureFacts },
  onShare: (share: number) => void,
): Promise<ChannelScan[]> {
  const kit = createSpectrumKit(source.sampleRateHz, options.plan, options.windowName);
  const { sampleFormat, bitsPerSample } = context.capture;
  const meters = names.map((_, index) => {
    const trackerOf = (search: ToneSearch | null | undefined) =>
      search === null || search === undefined ? null : createToneTracker(kit, search);
    const tracker = trackerOf(options.searches[index]);
    const lowTracker = trackerOf(options.lowSearches?.[index]);
    return {
      tracker,
      lowTracker,
      level: createLevelMeter(sampleFormat === 'integer' ? { integerBits: bitsPerSample } : {}),
      truePeak: createTruePeakMeter(source.sampleRateHz),
      spectrum: createSpectrumAccumulator(kit, (spectrum, start) => {
        tracker?.onSpectrum(spectrum, start);
        lowTracker?.onSpectrum(spectrum, start);
      }),
    };
  });
  let at = 0;
  const push = (channels: readonly Float64Array[]): void => {
    channels.forEach((samples, index) => {
      const { level, truePeak, spectrum } = meters[index];
      level.push(samples);
      truePeak.push(softenEnds(samples, at, range.to - range.from));
      spectrum.push(samples);
    });
    at += channels[0].length;
  };
  await streamFrames(source, range, context, push, onShare);
  return meters.map(({ tracker, lowTracker, level, truePeak, spectrum }, index) => ({
    channel: names[index],
    level: level.read(),
    // Faded ends must not hide a sample that was there.
    truePeak: Math.max(truePeak.read(), level.read().samplePeak),
    ...spectrum.finish(),
    tone: tracker?.finish() ?? null,
    lowTone: lowTracker?.finish() ?? null,
  }));
}
