import type { FramePlan } from './plan-frames.js';

/** Hands on the frames of a plan while samples stream past, one channel. */
export interface FrameWalker {
  /** @param samples - the next samples of the segment, any number; copied */
  push(samples: Float64Array): void;
}

/**
 * Makes a walker that keeps no more of the segment than one frame and what was pushed last.
 *
 * @param plan - where the frames lie in the segment
 * @param onFrame - told each frame in order; the array is reused and must not be kept
 */
export function createFrameWalker(
  plan: FramePlan,
  onFrame: (frame: Float64Array, index: number) => void,
): FrameWalker {
  const { fftLength, starts } = plan;
  const held = new Float64Array(2 * fftLength);
  let heldFrom = 0;
  let heldCount = 0;
  let next = 0;
  const handOn = (): void => {
    while (next < starts.length && starts[next] + fftLength <= heldFrom + heldCount) {
      const at = starts[next] - heldFrom;
      onFrame(held.subarray(at, at + fftLength), next);
      next++;
    }
  };
  const dropUsed = (): void => {
    const keepFrom = Math.min(starts[next] ?? heldFrom + heldCount, heldFrom + heldCount);
    held.copyWithin(0, keepFrom - heldFrom, heldCount);
    heldCount -= keepFrom - heldFrom;
    heldFrom = keepFrom;
  };
  return {
    push: (samples) => {
      let taken = 0;
      while (taken < samples.length && next < starts.length) {
        if (heldCount === held.length) dropUsed();
        const count = Math.min(samples.length - taken, held.length - heldCount);
        held.set(samples.subarray(taken, taken + count), heldCount);
        heldCount += count;
        taken += count;
        handOn();
      }
    },
  };
}
