import { DspInputError } from '../errors.js';
import type { SampleSource } from '../source/sample-source.js';
import type { StimulusDescriptor } from './descriptor.js';
import { choosePairs, type ChosenPairs } from './marks/choose-pairs.js';
import { createDecimator } from './marks/create-decimator.js';
import { createCandidateFinder, type MarkCandidate } from './marks/find-candidates.js';
import type { ReadSpan } from './marks/judge-role.js';
import { pairCandidates } from './marks/pair-candidates.js';
import { solveTimes, type FileTimes, type MarkPair } from './marks/solve-times.js';
import { findStrongestChannel } from './marks/strongest-channel.js';
import { lookAtMark, verifyPairs } from './marks/verify-pairs.js';
import { RAMP_S } from './bodies/body.js';
import { BESIDE_BODY_S, MARK_TO_BODY_S } from './stimulus-layout.js';

export interface LocateOptions {
  /** With it, files of other parameters give delay and clock as exactly as those of the table. */
  readonly descriptor?: StimulusDescriptor | null;
  /** Told the share of the work done, 0 to 1. */
  readonly onProgress?: (share: number) => void;
  /** Looked at between blocks; once aborted, `CANCELLED` is thrown. */
  readonly signal?: { readonly aborted: boolean };
}

export interface MarkMatch {
  /** The number in the marks' gap; 63 says "other parameters". */
  readonly code: number;
  readonly stimulusName: string | null;
  /**
   * Where the stimulus file's first frame falls in the recording, seconds; negative when the recorder started late. Null
   * when only the end pair was recorded and nothing says how long the file is.
   */
  readonly delayS: number | null;
  /** Positive when the player is fast against the recorder; null when noisy gaps alone can't tell it to 1 ppm. */
  readonly clockOffsetPpm: number | null;
  readonly polarity: 'same' | 'inverted';
  /** The body's steady part, in the recording's seconds, cut to the recording. */
  readonly bodyFromS: number;
  readonly bodyToS: number;
  /** The least likeness of the marks used, 0 to 1: 1 without noise, 0.7 with as much noise as mark in their band. */
  readonly confidence: number;
}

const BLOCK_FRAMES = 131_072;
const TRUSTED_DEVIATION = 1e-6;

async function findCandidates(
  source: SampleSource,
  channel: number,
  { onProgress, signal }: LocateOptions,
): Promise<MarkCandidate[]> {
  const decimator = createDecimator(source.sampleRateHz);
  const finder = createCandidateFinder(decimator.sampleRateHz);
  for (let frame = 0; frame < source.frameCount; frame += BLOCK_FRAMES) {
    if (signal?.aborted) throw new DspInputError('CANCELLED', 'the search for marks was cancelled');
    const channels = await source.read(frame, BLOCK_FRAMES);
    finder.push(decimator.push(channels[channel]));
    onProgress?.(Math.min(1, (frame + BLOCK_FRAMES) / source.frameCount));
  }
  finder.push(decimator.flush());
  return finder.finish();
}

function createReadSpan(source: SampleSource, channel: number): ReadSpan {
  const frameOf = (atS: number) =>
    Math.max(0, Math.min(source.frameCount, Math.round(atS * source.sampleRateHz)));
  return async (fromS, toS) => {
    const fromFrame = frameOf(fromS);
    const channels = await source.read(fromFrame, Math.max(0, frameOf(toS) - fromFrame));
    return channels[channel];
  };
}

/** Looks again at every mark with the clock that the first look gave. */
async function lookAgain(
  read: ReadSpan,
  sampleRateHz: number,
  chosen: ChosenPairs,
  speed: number,
): Promise<ChosenPairs> {
  const again = async (pair: MarkPair | null): Promise<MarkPair | null> => {
    if (!pair) return null;
    const near = { speed, isStartKnown: true };
    const first = await lookAtMark(read, sampleRateHz, { ...near, atS: pair[0].atS });
    const second = await lookAtMark(read, sampleRateHz, { ...near, atS: pair[1].atS });
    return [first ?? pair[0], second ?? pair[1]];
  };
  return { ...chosen, start: await again(chosen.start), end: await again(chosen.end) };
}

/** The body lies at fixed distances from the marks; where a pair is missing, its place is reckoned or the recording ends. */
function findBody({ start, end, layout }: ChosenPairs, { speed, delayS }: FileTimes, durationS: number) {
  const reckon = (fileS: number | null) =>
    fileS === null || delayS === null ? null : delayS + fileS / speed;
  const endMarkS = end ? end[0].atS : reckon(layout.endS);
  const fromS = start ? start[1].atS + (MARK_TO_BODY_S + RAMP_S) / speed : 0;
  const toS = endMarkS === null ? durationS : endMarkS - (BESIDE_BODY_S + RAMP_S) / speed;
  const bodyToS = Math.max(0, Math.min(durationS, toS));
  return { bodyFromS: Math.min(bodyToS, fromS), bodyToS };
}

/**
 * Looks for a stimulus's marks in a recording, in the channel that carries most: any delay, gain and polarity, another
 * sample rate than the file's, clocks up to 200 ppm apart, a recorder that started late or stopped early.
 *
 * @param source - read once in blocks and in a few short runs; memory doesn't grow with it
 * @returns null when it holds no pair of marks (or none that fits the descriptor)
 * @throws DspInputError `CANCELLED`, and what reading throws
 * @see C. E. Cook and M. Bernfeld, Radar Signals, 1967: chirps and matched filters (chapter from memory)
 */
export async function locateMarks(
  source: SampleSource,
  options: LocateOptions = {},
): Promise<MarkMatch | null> {
  const { sampleRateHz, frameCount } = source;
  const channel = await findStrongestChannel(source);
  const candidates = pairCandidates(await findCandidates(source, channel, options));
  const read = createReadSpan(source, channel);
  const verified = await verifyPairs(read, sampleRateHz, candidates);
  const rough = await choosePairs(read, sampleRateHz, verified, options.descriptor ?? null);
  if (!rough) return null;
  const chosen = await lookAgain(read, sampleRateHz, rough, solveTimes(rough, rough.layout).speed);
  const times = solveTimes(chosen, chosen.layout);
  const amplitude = (chosen.start ?? chosen.end)?.[0].amplitude ?? 0;
  return {
    code: chosen.layout.code,
    stimulusName: chosen.layout.name,
    delayS: times.delayS,
    clockOffsetPpm: times.speedDeviation < TRUSTED_DEVIATION ? (times.speed - 1) * 1e6 : null,
    polarity: amplitude < 0 ? 'inverted' : 'same',
    ...findBody(chosen, times, frameCount / sampleRateHz),
    confidence: chosen.likeness,
  };
}
