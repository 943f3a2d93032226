import type { StimulusChannels } from '../descriptor.js';
import { addMark, type MarkSection } from './mark-section.js';
import { addMultitone, type MultitoneSection } from './multitone-section.js';
import { addPattern, type PatternSection } from './pattern-section.js';
import { addPinkNoise, type PinkNoiseSection } from './pink-noise-section.js';
import type { SectionRun, Span } from './span.js';
import { addSweep, type SweepSection } from './sweep-section.js';
import { addTone, type ToneSection } from './tone-section.js';
import { addWhiteNoise, type WhiteNoiseSection } from './white-noise-section.js';

export type Section =
  | ToneSection
  | MarkSection
  | SweepSection
  | WhiteNoiseSection
  | PinkNoiseSection
  | PatternSection
  | MultitoneSection;

function addSection(section: Section, run: SectionRun): void {
  if (section.kind === 'tone') addTone(section, run);
  else if (section.kind === 'mark') addMark(section, run);
  else if (section.kind === 'sweep') addSweep(section, run);
  else if (section.kind === 'white-noise') addWhiteNoise(section, run);
  else if (section.kind === 'pink-noise') addPinkNoise(section, run);
  else if (section.kind === 'multitone') addMultitone(section, run);
  else addPattern(section, run);
}

/** Moves a section of a body to where the body lies in the file. */
export function moveSection<T extends Section>(section: T, frames: number): T {
  const moved = { ...section, fromFrame: section.fromFrame + frames };
  return moved.kind === 'tone' ? { ...moved, originFrame: moved.originFrame + frames } : moved;
}

function isInRun({ fromFrame, frameCount }: Span, run: SectionRun): boolean {
  return fromFrame < run.fromFrame + run.samples.length && fromFrame + frameCount > run.fromFrame;
}

/**
 * Renders a run of frames of a file made of sections; the same frames come out however they are cut into runs.
 *
 * @param fromFrame - first frame of the run
 * @param count - frames in the run
 * @returns left and right, linear, ±1.0 = full scale; zero where no section is
 */
export function renderSections(
  sections: readonly Section[],
  sampleRateHz: number,
  fromFrame: number,
  count: number,
): [Float64Array, Float64Array] {
  const renderOf = (channels: StimulusChannels): Float64Array => {
    const run: SectionRun = { samples: new Float64Array(count), fromFrame, sampleRateHz };
    for (const section of sections) {
      if (section.channels === channels && isInRun(section, run)) addSection(section, run);
    }
    return run.samples;
  };
  const [both, left, right] = [renderOf('both'), renderOf('left'), renderOf('right')];
  for (let n = 0; n < count; n++) {
    left[n] += both[n];
    right[n] += both[n];
  }
  return [left, right];
}
