import type { Break } from '@benchlark/dsp';

/** The longest stretch of a recording without a damaged block, frames. */
export function longestCleanStretch(
  frameCount: number,
  breaks: readonly Pick<Break, 'fromFrame' | 'toFrame'>[],
): { fromFrame: number; toFrame: number } {
  let best = { fromFrame: 0, toFrame: 0 };
  let from = 0;
  const ends = [...breaks].sort((a, b) => a.fromFrame - b.fromFrame);
  for (const { fromFrame, toFrame } of [...ends, { fromFrame: frameCount, toFrame: frameCount }]) {
    if (fromFrame - from > best.toFrame - best.fromFrame) best = { fromFrame: from, toFrame: fromFrame };
    from = Math.max(from, toFrame);
  }
  return best;
}
