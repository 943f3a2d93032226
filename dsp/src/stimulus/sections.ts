import { MARK_DURATION_S, markAt } from './mark-chirp.js';

/** A steady tone whose first and last `rampFrames` frames rise and fall as raised cosines. */
export interface ToneSection {
  readonly kind: 'tone';
  readonly fromFrame: number;
  readonly frameCount: number;
  readonly rampFrames: number;
  readonly frequencyHz: number;
  readonly amplitude: number;
}

export interface MarkSection {
  readonly kind: 'mark';
  readonly atS: number;
  readonly amplitude: number;
}

export type Section = ToneSection | MarkSection;

function addTone(section: ToneSection, sampleRateHz: number, fromFrame: number, samples: Float64Array): void {
  const { frequencyHz, amplitude, rampFrames, frameCount } = section;
  const first = Math.max(0, section.fromFrame - fromFrame);
  const end = Math.min(samples.length, section.fromFrame + frameCount - fromFrame);
  // Whole turns are taken off before the sine: frame · whole hertz is counted in integers, modulo the rate.
  const wholeHz = Math.floor(frequencyHz);
  const restHz = frequencyHz - wholeHz;
  let frame = fromFrame + first - section.fromFrame;
  let count = (frame * wholeHz) % sampleRateHz;
  for (let n = first; n < end; n++, frame++) {
    const turns = (count + ((frame * restHz) % sampleRateHz)) / sampleRateHz;
    const fromEdge = Math.min(frame, frameCount - 1 - frame);
    const gain = fromEdge < rampFrames ? 0.5 - 0.5 * Math.cos((Math.PI * fromEdge) / rampFrames) : 1;
    samples[n] += amplitude * gain * Math.sin(2 * Math.PI * turns);
    count += wholeHz;
    if (count >= sampleRateHz) count -= sampleRateHz;
  }
}

function addMark(section: MarkSection, sampleRateHz: number, fromFrame: number, samples: Float64Array): void {
  const { atS, amplitude } = section;
  const first = Math.max(0, Math.ceil(atS * sampleRateHz) - fromFrame);
  const end = Math.min(samples.length, Math.ceil((atS + MARK_DURATION_S) * sampleRateHz) - fromFrame);
  for (let n = first; n < end; n++) {
    samples[n] += amplitude * markAt((fromFrame + n) / sampleRateHz - atS);
  }
}

/**
 * Renders a run of frames of a file made of sections; the same frames come out however they are cut into runs.
 *
 * @param fromFrame - first frame of the run
 * @param count - frames in the run
 * @returns linear, ±1.0 = full scale; zero where no section is
 */
export function renderSections(
  sections: readonly Section[],
  sampleRateHz: number,
  fromFrame: number,
  count: number,
): Float64Array {
  const samples = new Float64Array(count);
  for (const section of sections) {
    if (section.kind === 'tone') addTone(section, sampleRateHz, fromFrame, samples);
    else addMark(section, sampleRateHz, fromFrame, samples);
  }
  return samples;
}
