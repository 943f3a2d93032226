import type { StimulusChannels } from '../descriptor.js';

/** Where a section lies in its file, and in which channels. */
export interface Span {
  readonly channels: StimulusChannels;
  readonly fromFrame: number;
  readonly frameCount: number;
}

/** A run of frames that sections are added to. */
export interface SectionRun {
  readonly samples: Float64Array;
  readonly fromFrame: number;
  readonly sampleRateHz: number;
}

/** First sample of a run that a section reaches, the one after its last, and the section's own frame at the first. */
export function overlapOf({ fromFrame, frameCount }: Span, run: SectionRun) {
  const first = Math.max(0, fromFrame - run.fromFrame);
  const end = Math.min(run.samples.length, fromFrame + frameCount - run.fromFrame);
  return { first, end, frame: run.fromFrame + first - fromFrame };
}

/** Gain of a raised cosine at either end of a span, at one of its frames. */
export function rampGain(frame: number, frameCount: number, rampFrames: number): number {
  const fromEdge = Math.min(frame, frameCount - 1 - frame);
  return fromEdge < rampFrames ? 0.5 - 0.5 * Math.cos((Math.PI * fromEdge) / rampFrames) : 1;
}
