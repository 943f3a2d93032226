import { addPattern, PATTERN_FRAMES } from '../../stimulus/sections/pattern-section.js';

/** Lines of the exact pattern of so many bits, by odd multiple of its low square beside the tone, against the tone. */
export interface PatternLines {
  readonly bits: number;
  /** Index: multiple of the low square's frequency above the tone, 1 to 48; amplitude ratio. */
  readonly upper: readonly number[];
  readonly lower: readonly number[];
}

/** The tone's place among the pattern's 192 lines. */
const TONE_LINE = PATTERN_FRAMES / 4;

/**
 * Computes the pattern's own lines: what a perfect clock leaves beside the tone.
 *
 * @see J. Dunn and I. Dennis, 96th AES Convention, 1994: the pattern; lines by the definition of the transform
 */
export function patternLines(bits: number): PatternLines {
  const samples = new Float64Array(PATTERN_FRAMES);
  addPattern(
    {
      kind: 'pattern',
      channels: 'both',
      fromFrame: 0,
      frameCount: PATTERN_FRAMES,
      rampFrames: 0,
      amplitude: 0.5,
      step: 2 ** (1 - bits),
    },
    { samples, fromFrame: 0, sampleRateHz: PATTERN_FRAMES },
  );
  const amplitudeOf = (line: number): number => {
    let [re, im] = [0, 0];
    samples.forEach((x, n) => {
      const angle = (2 * Math.PI * ((n * line) % PATTERN_FRAMES)) / PATTERN_FRAMES;
      re += x * Math.cos(angle);
      im += x * Math.sin(angle);
    });
    return Math.hypot(re, im);
  };
  const tone = amplitudeOf(TONE_LINE);
  const multiples = Array.from({ length: TONE_LINE + 1 }, (_, multiple) => multiple);
  return {
    bits,
    upper: multiples.map((multiple) => amplitudeOf(TONE_LINE + multiple) / tone),
    lower: multiples.map((multiple) => amplitudeOf(TONE_LINE - multiple) / tone),
  };
}

/** A line within this of the pattern's own is the pattern's. */
const OWN_DB = 6;
const OWN_RATIO = 10 ** (OWN_DB / 20);

/**
 * Tells whether a pair of lines is the pattern's own.
 *
 * @param offsetHz - from the tone
 * @param toneHz - the tone as recorded: the low square is a 48th of it
 * @param amplitude - of the lines against the tone
 * @param toleranceHz - how well the offset is known
 */
export function isOwnPair(
  candidates: readonly PatternLines[],
  offsetHz: number,
  toneHz: number,
  amplitude: number,
  toleranceHz: number,
): boolean {
  const multiple = Math.round((offsetHz * TONE_LINE) / toneHz);
  if (multiple % 2 === 0 || multiple > TONE_LINE) return false;
  if (Math.abs(offsetHz - (multiple * toneHz) / TONE_LINE) > toleranceHz) return false;
  return candidates.some(({ upper, lower }) => {
    const own = Math.max(upper[multiple], lower[multiple]);
    return amplitude < own * OWN_RATIO && amplitude > own / OWN_RATIO;
  });
}
