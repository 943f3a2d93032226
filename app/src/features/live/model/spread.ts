import type { BenchRecord } from '@benchlark/dsp';
import { FIGURE_KEYS } from '@/lib/figures';
import type { LocalTake } from './take';

/** What repeats of one take tell of a figure (GUM, type A evaluation). */
export interface Spread {
  readonly key: string;
  readonly channel: string;
  readonly count: number;
  readonly mean: number;
  /** Of a single take: the experimental standard deviation, n - 1. */
  readonly deviation: number;
  /** Of the mean: deviation over the root of n. */
  readonly standardUncertainty: number;
}

const MOST_FIGURES = 4;

/** Spreads of the first figures that every repeat has, of every channel. */
export function spreadsOf(records: readonly BenchRecord[]): Spread[] {
  const [first] = records;
  if (!first || records.length < 2) return [];
  return first.channels.flatMap(({ channel }) => {
    const valuesOf = (key: string): number[] =>
      records.flatMap(({ channels }) => {
        const value = channels.find((one) => one.channel === channel)?.figures[key];
        return typeof value === 'number' ? [value] : [];
      });
    return FIGURE_KEYS.filter((key) => valuesOf(key).length === records.length)
      .slice(0, MOST_FIGURES)
      .map((key) => ({ key, channel, ...spreadOf(valuesOf(key)) }));
  });
}

export function spreadOf(values: readonly number[]): Omit<Spread, 'key' | 'channel'> {
  const count = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / count;
  const square = values.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  const deviation = Math.sqrt(square / (count - 1));
  return { count, mean, deviation, standardUncertainty: deviation / Math.sqrt(count) };
}

/** Series of at least two measured repeats, each under its name. */
export function seriesOf(
  takes: readonly LocalTake[],
): { id: string; title: string; records: BenchRecord[] }[] {
  const series = new Map<string, { id: string; title: string; records: BenchRecord[] }>();
  for (const { statement, title, record } of takes) {
    if (!statement.series || !record) continue;
    const { id } = statement.series;
    const known = series.get(id) ?? { id, title, records: [] };
    known.records.push(record);
    series.set(id, known);
  }
  return [...series.values()].filter(({ records }) => records.length > 1);
}
