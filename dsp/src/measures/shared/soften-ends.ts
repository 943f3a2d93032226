/** Samples over which an end is faded: several times the interpolator's reach. */
const FADE_SAMPLES = 64;

/**
 * Fades the first and last samples of a segment, for the true peak alone.
 *
 * An interpolator fed with a tone that starts out of nothing overshoots at the cut, by up to a decibel; the tone was never
 * cut, only the segment is. EBU Tech 3341 fades its true-peak signals in and out for the same reason.
 *
 * @param samples - a block; not modified
 * @param at - the block's first sample, counted from the segment's start
 * @param length - samples in the segment
 * @returns the block itself where no end is near, else a faded copy
 */
export function softenEnds(samples: Float64Array, at: number, length: number): Float64Array {
  if (at >= FADE_SAMPLES && at + samples.length <= length - FADE_SAMPLES) return samples;
  return samples.map((value, n) => {
    const fromEnd = Math.min(at + n, length - 1 - at - n);
    return fromEnd >= FADE_SAMPLES
      ? value
      : value * Math.sin((Math.PI / 2) * ((fromEnd + 0.5) / FADE_SAMPLES)) ** 2;
  });
}
