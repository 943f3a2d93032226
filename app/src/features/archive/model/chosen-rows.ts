import type { Capture } from '@/lib/api-schema';
import { dayParts } from '@/lib/format/date';

/**
 * The length of each day's run of rows, at its first row; zero at the others.
 *
 * @example two captures on the 19th and one on the 12th give [2, 0, 1]
 */
export function daysOf(captures: readonly Pick<Capture, 'uploadedAt'>[]): number[] {
  const spans: number[] = [];
  let first = -1;
  let day = '';
  captures.forEach(({ uploadedAt }, index) => {
    const { key } = dayParts(uploadedAt);
    if (key !== day) {
      day = key;
      first = index;
    }
    spans[index] = 0;
    spans[first] = (spans[first] ?? 0) + 1;
  });
  return spans;
}

/** The rows from the last touched one to this one, as Shift means it; this one alone where there is no last one. */
export function spanTo(numbers: readonly number[], last: number | null, target: number): readonly number[] {
  const from = last === null ? -1 : numbers.indexOf(last);
  const to = numbers.indexOf(target);
  if (from < 0 || to < 0) return [target];
  return numbers.slice(Math.min(from, to), Math.max(from, to) + 1);
}

/** Neighbouring captures of one day put together, with the day's parts. */
export function byDay(captures: readonly Capture[]) {
  const days: (ReturnType<typeof dayParts> & { items: Capture[] })[] = [];
  for (const capture of captures) {
    const parts = dayParts(capture.uploadedAt);
    const last = days.at(-1);
    if (last?.key === parts.key) last.items.push(capture);
    else days.push({ ...parts, items: [capture] });
  }
  return days;
}
