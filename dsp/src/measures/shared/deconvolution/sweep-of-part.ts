import type { StimulusPart } from '../../../stimulus/descriptor.js';
import { sweepDurationS, type SweepSignal } from '../../../stimulus/sweep-signal.js';
import { partNumber } from '../align-stimulus.js';

/** The sweep that a part's parameters describe; null where they describe none. */
export function sweepOfPart(part: Pick<StimulusPart, 'parameters'>): SweepSignal | null {
  const [lowHz, highHz, rateS, fadeInS, fadeOutS] = ['lowHz', 'highHz', 'rateS', 'fadeInS', 'fadeOutS'].map(
    (key) => partNumber(part, key),
  );
  if (lowHz === null || highHz === null || rateS === null) return null;
  if (!(lowHz > 0 && highHz > lowHz && rateS > 0)) return null;
  const sweep = { lowHz, highHz, rateS, fadeInS: fadeInS ?? 0, fadeOutS: fadeOutS ?? 0 };
  // A descriptor from elsewhere must not ask for more memory than a sensible sweep needs.
  return sweepDurationS(sweep) <= LONGEST_SWEEP_S ? sweep : null;
}

const LONGEST_SWEEP_S = 60;
