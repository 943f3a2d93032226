/** Longest transform used: beyond it, lines get no sharper than real clocks are steady. */
export const LONGEST_FFT = 262_144;
/** Fewer samples than this make no spectrum worth the name. */
export const SHORTEST_FFT = 512;

/** Above this many averages a wider spacing loses next to nothing and saves half the work. */
const AVERAGES_ENOUGH = 16;

export interface FramePlan {
  readonly fftLength: number;
  /** First sample of each frame, ascending, counted from the segment's start; the last frame ends with the segment. */
  readonly starts: readonly number[];
}

/**
 * Places the frames of an averaged spectrum so that they cover a segment from its first sample to its last.
 *
 * @param frameCount - samples a channel in the segment, ≥ SHORTEST_FFT
 * @returns the longest power of two that fits, up to 262,144; frames overlap by 75 % or, in a long segment, by half
 */
export function planFrames(frameCount: number): FramePlan {
  const fftLength = Math.min(LONGEST_FFT, 2 ** Math.floor(Math.log2(frameCount)));
  const rest = frameCount - fftLength;
  const close = Math.ceil(rest / (fftLength / 4));
  const gaps = close < AVERAGES_ENOUGH ? close : Math.max(AVERAGES_ENOUGH, Math.ceil(rest / (fftLength / 2)));
  const starts = Array.from({ length: gaps + 1 }, (_, m) => (gaps === 0 ? 0 : Math.round((m * rest) / gaps)));
  return { fftLength, starts };
}
