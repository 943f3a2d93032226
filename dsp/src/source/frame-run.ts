import { DspInputError } from '../errors.js';

/** Frames of a source; `to` is the first one left out. */
export interface FrameRun {
  readonly from: number;
  readonly to: number;
}

/**
 * Checks a request for frames and cuts it at the end of the source.
 *
 * @param frameCount - frames the source holds
 * @param fromFrame - first frame wanted, 0 ≤ fromFrame ≤ frameCount
 * @param count - frames wanted, 0 or more
 * @returns how many of them there are
 * @throws DspInputError `OUT_OF_RANGE` when either isn't a whole number in its range
 */
export function countFramesInRun(frameCount: number, fromFrame: number, count: number): number {
  if (!Number.isInteger(fromFrame) || fromFrame < 0 || fromFrame > frameCount) {
    throw new DspInputError('OUT_OF_RANGE', `frame ${fromFrame} was asked for, and there are ${frameCount}`);
  }
  if (!Number.isInteger(count) || count < 0) {
    throw new DspInputError(
      'OUT_OF_RANGE',
      `${count} frames were asked for, and only whole runs can be read`,
    );
  }
  return Math.min(count, frameCount - fromFrame);
}
