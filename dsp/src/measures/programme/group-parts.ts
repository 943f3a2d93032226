import type { AlignedPart } from '../shared/align-stimulus.js';

/** Parts that make one segment of the record: one alone, or the two turns of a separation. */
export type PartGroup = readonly [AlignedPart, ...AlignedPart[]];

export function groupParts(parts: readonly AlignedPart[]): PartGroup[] {
  const groups: PartGroup[] = [];
  for (const part of parts) {
    const last = groups.at(-1);
    const joins = last !== undefined && part.measure === 'separation' && last[0].measure === 'separation';
    if (joins) groups[groups.length - 1] = [...last, part];
    else groups.push([part]);
  }
  return groups;
}
