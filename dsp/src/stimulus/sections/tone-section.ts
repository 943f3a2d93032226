import { overlapOf, rampGain, type SectionRun, type Span } from './span.js';

/** A steady tone whose first and last `rampFrames` frames rise and fall as raised cosines. */
export interface ToneSection extends Span {
  readonly kind: 'tone';
  readonly rampFrames: number;
  readonly frequencyHz: number;
  readonly amplitude: number;
  /** Frame at which the tone's phase is `phaseTurns`; steps of one tone share it, so that they join without a jump. */
  readonly originFrame: number;
  readonly phaseTurns: number;
}

export function addTone(section: ToneSection, run: SectionRun): void {
  const { frequencyHz, amplitude, rampFrames, frameCount, phaseTurns } = section;
  const { samples, sampleRateHz } = run;
  const { first, end, frame: firstFrame } = overlapOf(section, run);
  // Whole turns are taken off before the sine: frame · whole hertz is counted in integers, modulo the rate.
  const wholeHz = Math.floor(frequencyHz);
  const restHz = frequencyHz - wholeHz;
  const fromOrigin = section.fromFrame - section.originFrame;
  let count = ((fromOrigin + firstFrame) * wholeHz) % sampleRateHz;
  for (let n = first, frame = firstFrame; n < end; n++, frame++) {
    const turns = (count + (((fromOrigin + frame) * restHz) % sampleRateHz)) / sampleRateHz + phaseTurns;
    samples[n] += amplitude * rampGain(frame, frameCount, rampFrames) * Math.sin(2 * Math.PI * turns);
    count += wholeHz;
    if (count >= sampleRateHz) count -= sampleRateHz;
  }
}
