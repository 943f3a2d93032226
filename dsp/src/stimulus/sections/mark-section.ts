import { MARK_DURATION_S, markAt } from '../mark-chirp.js';
import { overlapOf, type SectionRun, type Span } from './span.js';

/** A mark, which may begin between two frames. */
export interface MarkSection extends Span {
  readonly kind: 'mark';
  readonly atS: number;
  readonly amplitude: number;
}

/** The frames that a mark touches. */
export function spanOfMark(atS: number, sampleRateHz: number): Pick<Span, 'fromFrame' | 'frameCount'> {
  const fromFrame = Math.ceil(atS * sampleRateHz);
  return { fromFrame, frameCount: Math.ceil((atS + MARK_DURATION_S) * sampleRateHz) - fromFrame };
}

export function addMark(section: MarkSection, run: SectionRun): void {
  const { first, end } = overlapOf(section, run);
  for (let n = first; n < end; n++) {
    run.samples[n] += section.amplitude * markAt((run.fromFrame + n) / run.sampleRateHz - section.atS);
  }
}
