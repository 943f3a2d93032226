import { renderSweep, type SweepSignal } from '../sweep-signal.js';
import { overlapOf, type SectionRun, type Span } from './span.js';

/** A sweep whose time 0 is the section's first frame. */
export interface SweepSection extends Span {
  readonly kind: 'sweep';
  readonly sweep: SweepSignal;
  readonly amplitude: number;
}

export function addSweep(section: SweepSection, run: SectionRun): void {
  const { first, end, frame } = overlapOf(section, run);
  const part = new Float64Array(end - first);
  renderSweep(section.sweep, 0, 1 / run.sampleRateHz, part, frame);
  for (let n = 0; n < part.length; n++) run.samples[first + n] += section.amplitude * part[n];
}
