import type { FetchedTrace } from '@/lib/fetch-trace';
import type { ServedBody } from '../api/record-queries';

/** The trace that a small drawing of each measure shows; else the first there is. */
const MAIN_TRACES: Partial<Record<ServedBody['measure'], string>> = {
  'level-steps': 'deviation',
  'two-tone-steps': 'modulationDistortion',
  sweep: 'response',
  multitone: 'response',
  separation: 'leftToRight',
  jitter: 'closeIn',
  filter: 'response',
  loudness: 'shortTerm',
};

export function mainTraceOf({ measure, channels, between }: ServedBody): string | null {
  const names = [...channels, between].flatMap(({ traces }) => Object.keys(traces));
  const wanted = MAIN_TRACES[measure] ?? 'spectrum';
  return names.includes(wanted) ? wanted : (names[0] ?? null);
}

const POINTS = 64;
const FLOOR_DBFS = -160;
const LOWEST_HZ = 10;

/** A trace as 64 heights from 0 to 1, the highest point of each run; by octaves where x is a frequency. */
export function sketchShares({ x, y, xUnit, yUnit }: FetchedTrace): number[] {
  const isLog = xUnit === 'Hz' && (x[0] ?? 0) >= 0;
  const place = (value: number) => (isLog ? Math.log(Math.max(value, LOWEST_HZ)) : value);
  const from = place(x[0] ?? 0);
  const span = place(x[x.length - 1] ?? 1) - from || 1;
  const heights = new Array<number>(POINTS).fill(-Infinity);
  x.forEach((value, index) => {
    const bin = Math.min(POINTS - 1, Math.max(0, Math.floor(((place(value) - from) / span) * POINTS)));
    heights[bin] = Math.max(heights[bin] ?? -Infinity, y[index] ?? -Infinity);
  });
  // Between sparse points the line goes on.
  for (let bin = 1; bin < POINTS; bin += 1) {
    if (heights[bin] === -Infinity) heights[bin] = heights[bin - 1] ?? -Infinity;
  }
  const known = heights.filter(Number.isFinite);
  const isSpectrum = yUnit === 'dBFS' && xUnit === 'Hz';
  const top = isSpectrum ? 0 : Math.max(...known);
  const bottom = isSpectrum ? FLOOR_DBFS : Math.min(...known);
  return heights.map((height) => {
    const share = (height - bottom) / (top - bottom || 1);
    return Number.isFinite(share) ? Math.min(1, Math.max(0, share)) : 0;
  });
}
