const NICE = [1, 2, 3, 4, 5, 6, 8, 10] as const;

/** The next round number of the same decade, so that ticks end on the frame. */
export function niceCeiling(value: number): number {
  if (!(value > 0)) return 1;
  const decade = 10 ** Math.floor(Math.log10(value));
  const lead = NICE.find((candidate) => candidate * decade >= value * (1 - 1e-9)) ?? 10;
  return Number((lead * decade).toPrecision(6));
}

export interface Range {
  readonly min: number;
  readonly max: number;
}

/** Least and greatest finite value of several lists; null where there is none. */
export function extentOf(lists: readonly ArrayLike<number>[]): Range | null {
  let [min, max] = [Infinity, -Infinity];
  for (const list of lists) {
    for (let index = 0; index < list.length; index += 1) {
      const value = list[index] ?? NaN;
      if (!Number.isFinite(value)) continue;
      min = Math.min(min, value);
      max = Math.max(max, value);
    }
  }
  return min <= max ? { min, max } : null;
}

/** Out to multiples of a step, at least one step wide. */
export function stepRange(lists: readonly ArrayLike<number>[], step: number): Range {
  const extent = extentOf(lists) ?? { min: -step, max: 0 };
  const min = Math.floor(extent.min / step + 1e-9) * step;
  const max = Math.ceil(extent.max / step - 1e-9) * step;
  return max > min ? { min, max } : { min: min - step, max };
}

/** As far below zero as above, to a round number and no closer in than `least`. */
export function evenRange(lists: readonly ArrayLike<number>[], least: number): Range {
  const extent = extentOf(lists);
  const size = extent ? Math.max(Math.abs(extent.min), Math.abs(extent.max)) : 0;
  const top = size * 1.08 <= least ? least : niceCeiling(size * 1.08);
  return { min: -top, max: top };
}

/** A range with a little air, so that markers at its ends are whole. */
export function airedRange({ min, max }: Range, share = 0.016): Range {
  const air = (max - min) * share;
  return { min: min - air, max: max + air };
}
