import type { FrameRun } from '../../source/frame-run.js';
import type { StimulusBits, StimulusPart } from '../descriptor.js';
import type { Section } from '../sections/section.js';

/** What a body is made from. Values are checked; a value that the kind doesn't take is null. */
export interface BodyOptions {
  readonly sampleRateHz: number;
  readonly bitsPerSample: StimulusBits;
  readonly seed: number;
  readonly frequencyHz: number | null;
  readonly lowFrequencyHz: number | null;
  readonly highFrequencyHz: number | null;
  /** The top level, no higher than the ceiling. */
  readonly levelDbfs: number | null;
  readonly durationS: number | null;
  readonly isQuick: boolean;
  /** Caps a level by the ceiling. */
  readonly cap: (levelDbfs: number) => number;
  /** Peak of a level, capped, and kept off the ends of the scale. */
  readonly amplitudeOf: (levelDbfs: number) => number;
}

/** What lies between the marks, counted from its own first frame. */
export interface Body {
  readonly frameCount: number;
  readonly sections: readonly Section[];
  /** Times in seconds from the body's first frame. */
  readonly parts: readonly StimulusPart[];
  /** Frames that must stand in the file as they are, without dither. */
  readonly exact: readonly FrameRun[];
}

export type LayOutBody = (options: BodyOptions) => Body;

/** A raised-cosine rise or fall inside each end of a steady part; its spectrum is 100 dB down 2 kHz away. */
export const RAMP_S = 0.02;

/** Takes a value that the kind's own rules have made sure of. */
export function given<T>(value: T | null): T {
  if (value === null) throw new TypeError('a stimulus kind without a default for what it takes');
  return value;
}

export function framesOf(seconds: number, sampleRateHz: number): number {
  return Math.round(seconds * sampleRateHz);
}

/** One steady part with its ramps, over the whole body. */
export function steadySpan(durationS: number, sampleRateHz: number) {
  const frameCount = framesOf(durationS, sampleRateHz);
  const rampFrames = framesOf(RAMP_S, sampleRateHz);
  return {
    frameCount,
    rampFrames,
    fromS: rampFrames / sampleRateHz,
    toS: (frameCount - rampFrames) / sampleRateHz,
  };
}
