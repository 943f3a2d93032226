import type { StimulusDescriptor } from '../descriptor.js';
import { isStartPair, type ReadSpan } from './judge-role.js';
import { layoutOfCode, layoutOfDescriptor, type MarkLayout } from './mark-layout.js';
import type { FoundPairs } from './solve-times.js';
import type { VerifiedPair } from './verify-pairs.js';

export interface ChosenPairs extends FoundPairs {
  readonly layout: MarkLayout;
  readonly likeness: number;
}

/** 300 ppm of the clock, and a millisecond for a descriptor's rounding. */
const CLOCK_TOLERANCE = 3e-4;
const TOLERANCE_S = 1e-3;
/** Both pairs pass through the same chain. */
const MOST_RATIO = 1.5;

function isSameChain(one: VerifiedPair, other: VerifiedPair): boolean {
  const ratio = one.marks[0].amplitude / other.marks[0].amplitude;
  return one.code === other.code && ratio < MOST_RATIO && ratio > 1 / MOST_RATIO;
}

function coupleOf(start: VerifiedPair | null, end: VerifiedPair | null, layout: MarkLayout): ChosenPairs {
  const likeness = Math.min(start?.likeness ?? 1, end?.likeness ?? 1);
  return { start: start?.marks ?? null, end: end?.marks ?? null, layout, likeness };
}

/** Of the couples whose distance is the file's, the likeliest. */
function findCouple(
  pairs: readonly VerifiedPair[],
  layoutOf: (pair: VerifiedPair) => MarkLayout,
): ChosenPairs | null {
  let best: ChosenPairs | null = null;
  pairs.forEach((start, index) => {
    const layout = layoutOf(start);
    if (layout.endS === null) return;
    const distanceS = layout.endS - layout.startS;
    for (const end of pairs.slice(index + 1)) {
      const offS = Math.abs(end.marks[0].atS - start.marks[0].atS - distanceS);
      if (!isSameChain(start, end) || offS > distanceS * CLOCK_TOLERANCE + TOLERANCE_S) continue;
      const couple = coupleOf(start, end, layout);
      if (!best || couple.likeness > best.likeness) best = couple;
    }
  });
  return best;
}

/**
 * Chooses the pairs of one play of one file.
 *
 * @param pairs - in order of time
 * @param descriptor - of the file that was played, when known: only marks with its gap count then
 * @returns null when there are none
 */
export async function choosePairs(
  read: ReadSpan,
  sampleRateHz: number,
  pairs: readonly VerifiedPair[],
  descriptor: StimulusDescriptor | null,
): Promise<ChosenPairs | null> {
  const described = descriptor ? layoutOfDescriptor(descriptor) : null;
  if (descriptor && !described) return null;
  const fitting = described ? pairs.filter(({ code }) => code === described.code) : pairs;
  const layoutOf = ({ code }: VerifiedPair) => described ?? layoutOfCode(code);
  const couple = findCouple(fitting, layoutOf);
  if (couple) return couple;
  for (const [index, pair] of fitting.entries()) {
    if (!(await isStartPair(read, pair.marks, sampleRateHz))) continue;
    const layout = layoutOf(pair);
    // Where the file's length is known and no end pair stood there, the recorder stopped early.
    const next =
      layout.endS === null ? fitting.slice(index + 1).find((other) => isSameChain(pair, other)) : undefined;
    return coupleOf(pair, next ?? null, layout);
  }
  const last = fitting.at(-1);
  return last ? coupleOf(null, last, layoutOf(last)) : null;
}
