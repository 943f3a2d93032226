import { DspInputError } from '../errors.js';
import { countFramesInRun } from './frame-run.js';
import type { SampleSource } from './sample-source.js';

/**
 * Shows a part of a source as a source of its own; nothing is read or copied until it is asked for.
 *
 * @param source - the whole
 * @param fromFrame - first frame of the part, 0 ≤ fromFrame ≤ toFrame
 * @param toFrame - the frame after the last, at most the source's frame count
 * @throws DspInputError `OUT_OF_RANGE` when they aren't whole numbers in this order inside the source
 */
export function sliceSource(source: SampleSource, fromFrame: number, toFrame: number): SampleSource {
  const isInside = Number.isInteger(toFrame) && toFrame >= fromFrame && toFrame <= source.frameCount;
  if (!Number.isInteger(fromFrame) || fromFrame < 0 || !isInside) {
    throw new DspInputError(
      'OUT_OF_RANGE',
      `frames ${fromFrame} to ${toFrame} were asked for, and there are ${source.frameCount}`,
    );
  }
  const frameCount = toFrame - fromFrame;
  return {
    sampleRateHz: source.sampleRateHz,
    channelCount: source.channelCount,
    frameCount,
    read: async (from, count) => source.read(fromFrame + from, countFramesInRun(frameCount, from, count)),
  };
}
