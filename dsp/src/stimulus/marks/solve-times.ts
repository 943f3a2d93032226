import { gapOfMarkCode } from '../mark-codes.js';
import type { MarkLayout } from './mark-layout.js';
import type { RefinedMark } from './refine-mark.js';

export type MarkPair = readonly [RefinedMark, RefinedMark];

/** The pairs that were found, in the recording's seconds. */
export interface FoundPairs {
  readonly start: MarkPair | null;
  readonly end: MarkPair | null;
}

/** How the file lies in the recording. */
export interface FileTimes {
  /** Player's clock / recorder's clock. */
  readonly speed: number;
  /** Standard deviation that the noise leads one to expect, relative. */
  readonly speedDeviation: number;
  /** The recording's second at which the file's first frame falls; null when the file's length isn't known. */
  readonly delayS: number | null;
}

function middleOf(pair: MarkPair): number {
  return (pair[0].atS + pair[1].atS) / 2;
}

function deviationOf(pairs: readonly MarkPair[]): number {
  return Math.max(...pairs.flat().map(({ deviationS }) => deviationS));
}

/**
 * Solves for delay and clock: from the distance of the two pairs where the file's length is known, else from the gaps
 * within the pairs.
 *
 * @param found - at least one pair
 */
export function solveTimes({ start, end }: FoundPairs, layout: MarkLayout): FileTimes {
  const pairs = [start, end].filter((pair) => pair !== null);
  const gapS = gapOfMarkCode(layout.code);
  const fileMiddles = {
    start: layout.startS + gapS / 2,
    end: layout.endS === null ? null : layout.endS + gapS / 2,
  };
  const deviationS = deviationOf(pairs);
  if (start && end && fileMiddles.end !== null) {
    const recordedS = middleOf(end) - middleOf(start);
    const speed = (fileMiddles.end - fileMiddles.start) / recordedS;
    const recordedMiddle = (middleOf(end) + middleOf(start)) / 2;
    const delayS = recordedMiddle - (fileMiddles.end + fileMiddles.start) / 2 / speed;
    return { speed, speedDeviation: deviationS / recordedS, delayS };
  }
  const recordedGapsS = pairs.reduce((sum, [first, second]) => sum + second.atS - first.atS, 0);
  const speed = (gapS * pairs.length) / recordedGapsS;
  const speedDeviation = (Math.SQRT2 * deviationS) / gapS / Math.sqrt(pairs.length);
  const middleS = start ? fileMiddles.start : fileMiddles.end;
  const recordedS = middleOf(pairs[0]);
  return { speed, speedDeviation, delayS: middleS === null ? null : recordedS - middleS / speed };
}
