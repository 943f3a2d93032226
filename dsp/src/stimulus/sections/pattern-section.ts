import { overlapOf, rampGain, type SectionRun, type Span } from './span.js';

/**
 * A square wave of four frames with one of 192 frames and one step of the file's scale beside it: a tone of a quarter of
 * the rate whose own lines show what a recorder's clock does.
 *
 * @see J. Dunn and I. Dennis, "The diagnosis and solution of jitter-related problems in digital audio systems", 96th AES
 *   Convention, 1994: C00000 C00000 400000 400000 24 times, BFFFFF BFFFFF 3FFFFF 3FFFFF 24 times
 */
export interface PatternSection extends Span {
  readonly kind: 'pattern';
  /** At either end of the exact part; the pattern is not exact in them. */
  readonly rampFrames: number;
  /** A whole number of steps. */
  readonly amplitude: number;
  readonly step: number;
}

export const PATTERN_FRAMES = 192;

export function addPattern(section: PatternSection, run: SectionRun): void {
  const { frameCount, rampFrames, amplitude, step } = section;
  const { first, end, frame: firstFrame } = overlapOf(section, run);
  for (let n = first, frame = firstFrame; n < end; n++, frame++) {
    // Counted from the exact part's first frame.
    const place = (((frame - rampFrames) % PATTERN_FRAMES) + PATTERN_FRAMES) % PATTERN_FRAMES;
    const high = place % 4 >= 2 ? amplitude : -amplitude;
    const low = place >= PATTERN_FRAMES / 2 ? -step : 0;
    run.samples[n] += rampGain(frame, frameCount, rampFrames) * (high + low);
  }
}
