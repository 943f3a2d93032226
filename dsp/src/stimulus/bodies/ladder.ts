import type { StimulusStep } from '../descriptor.js';
import { framesOf, RAMP_S, type BodyOptions } from './body.js';

/** One rung of a ladder of levels. */
export interface Rung {
  readonly levelDbfs: number;
  readonly durationS: number;
}

/** A rung as it lies in its body: frames with the rise at its beginning and the fall after its end. */
export interface LaidRung {
  readonly levelDbfs: number;
  readonly fromFrame: number;
  readonly frameCount: number;
  readonly step: StimulusStep;
}

/** Shifts a ladder to a top level and caps it; rungs that the cap makes alike are left out but for the first. */
export function scaleLadder(
  rungs: readonly Rung[],
  topDbfs: number,
  cap: BodyOptions['cap'],
): readonly Rung[] {
  const scaled = rungs.map(({ levelDbfs, durationS }) => ({
    levelDbfs: cap(levelDbfs + topDbfs),
    durationS,
  }));
  return scaled.filter(({ levelDbfs }, index) => index === 0 || levelDbfs !== scaled[index - 1].levelDbfs);
}

/**
 * Lays rungs one after the other. Each falls while the next rises, as raised cosines that add up to one, so that a tone of
 * one phase goes from level to level without a click; the steady part begins after the rise.
 */
export function layLadder(
  rungs: readonly Rung[],
  sampleRateHz: number,
): { readonly rungs: readonly LaidRung[]; readonly frameCount: number; readonly rampFrames: number } {
  const rampFrames = framesOf(RAMP_S, sampleRateHz);
  let fromFrame = 0;
  const laid = rungs.map(({ levelDbfs, durationS }) => {
    const frames = framesOf(durationS, sampleRateHz);
    const step = {
      levelDbfs,
      fromS: (fromFrame + rampFrames) / sampleRateHz,
      toS: (fromFrame + frames) / sampleRateHz,
    };
    const rung = { levelDbfs, fromFrame, frameCount: frames + rampFrames, step };
    fromFrame += frames;
    return rung;
  });
  return { rungs: laid, frameCount: fromFrame + rampFrames, rampFrames };
}
