import { gapOfMarkCode, isMarkCode } from '../mark-codes.js';
import type { MarkCandidate } from './find-candidates.js';

/** Two places whose distance is that of a pair. */
export interface CandidatePair {
  readonly code: number;
  readonly marks: readonly [MarkCandidate, MarkCandidate];
}

/** A clock 300 ppm off over the longest gap, and a sample of the lowered rate. */
const TOLERANCE_S = 0.0004;
const LONGEST_GAP_S = 1;
/** Both marks of a pair pass through the same chain. */
const MOST_RATIO = 1.4;

/**
 * Pairs places by the gaps that the table of codes allows.
 *
 * @param candidates - in order of time
 * @returns pairs, the likeliest first
 */
export function pairCandidates(candidates: readonly MarkCandidate[]): CandidatePair[] {
  const pairs: CandidatePair[] = [];
  candidates.forEach((first, index) => {
    for (let k = index + 1; k < candidates.length; k++) {
      const second = candidates[k];
      const gapS = second.atS - first.atS;
      if (gapS > LONGEST_GAP_S) break;
      const code = Math.round(gapS * 100) - 30;
      const ratio = first.amplitude / second.amplitude;
      const isAlike = ratio < MOST_RATIO && ratio > 1 / MOST_RATIO;
      if (isAlike && isMarkCode(code) && Math.abs(gapS - gapOfMarkCode(code)) < TOLERANCE_S) {
        pairs.push({ code, marks: [first, second] });
      }
    }
  });
  const likeness = ({ marks }: CandidatePair) => Math.min(marks[0].likeness, marks[1].likeness);
  return pairs.sort((one, other) => likeness(other) - likeness(one));
}
