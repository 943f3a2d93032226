import type { StimulusMark } from './descriptor.js';
import { MARK_DURATION_S } from './mark-chirp.js';
import { gapOfMarkCode } from './mark-codes.js';

/** Opens mutes, lets receivers lock, and gives the clock offset. */
export const LEAD_IN_S = 2;
export const LEAD_IN_FREQUENCY_HZ = 997;
export const LEAD_IN_LEVEL_DBFS = -40;
/** Between the lead-in and the first mark. */
const BEFORE_MARKS_S = 0.1;
/** Between marks and body, and after the last mark: lets a chain's ringing and a recorder's latency pass. */
export const BESIDE_BODY_S = 0.25;

/** Where everything lies in a stimulus file, seconds from its first frame. */
export interface StimulusLayout {
  readonly leadInToS: number;
  readonly marks: readonly StimulusMark[];
  readonly bodyFromFrame: number;
  readonly frameCount: number;
}

/** From the beginning of a pair's second mark to the body, and from the body's end to a pair's first mark. */
export const MARK_TO_BODY_S = MARK_DURATION_S + BESIDE_BODY_S;

/**
 * Lays a file out: lead-in, start pair, body, end pair.
 *
 * @param bodyFrames - of the body with its ramps
 * @param code - the number in the marks' gaps; null for a bare file
 */
export function layOutStimulus(
  bodyFrames: number,
  sampleRateHz: number,
  code: number | null,
): StimulusLayout {
  if (code === null) return { leadInToS: 0, marks: [], bodyFromFrame: 0, frameCount: bodyFrames };
  const gapS = gapOfMarkCode(code);
  const startS = LEAD_IN_S + BEFORE_MARKS_S;
  const bodyFromFrame = Math.round((startS + gapS + MARK_TO_BODY_S) * sampleRateHz);
  const endS = (bodyFromFrame + bodyFrames) / sampleRateHz + BESIDE_BODY_S;
  return {
    leadInToS: LEAD_IN_S,
    marks: [
      { kind: 'start', atS: startS },
      { kind: 'start', atS: startS + gapS },
      { kind: 'end', atS: endS },
      { kind: 'end', atS: endS + gapS },
    ],
    bodyFromFrame,
    frameCount: Math.round((endS + gapS + MARK_TO_BODY_S) * sampleRateHz),
  };
}
