import type { Trace } from './record.js';

/** Points that a reduced trace has at most. */
export const REDUCED_TRACE_POINTS = 2000;

/**
 * Thins a trace without losing a peak: the points are parted into runs, and of each run the least and the greatest stay,
 * both true points of the full trace. Runs are of equal width on a logarithmic axis where x is a frequency (as a
 * spectrum is read), else of equal count.
 *
 * @param trace - x ascending; not modified
 * @param maxPoints - even, ≥ 4
 * @returns at most `maxPoints` points, x ascending; the first and last runs keep their ends' values if extreme
 */
export function reduceTrace(trace: Trace, maxPoints = REDUCED_TRACE_POINTS): Trace {
  const count = trace.x.length;
  if (count <= maxPoints) return trace;
  const edges =
    trace.xUnit === 'Hz' ? logarithmicEdges(trace.x, maxPoints / 2) : equalEdges(count, maxPoints / 2);
  const x: number[] = [];
  const y: number[] = [];
  const keep = (index: number): void => {
    x.push(trace.x[index]);
    y.push(trace.y[index]);
  };
  for (let run = 0; run + 1 < edges.length; run++) {
    let least = edges[run];
    let greatest = edges[run];
    for (let index = edges[run]; index < edges[run + 1]; index++) {
      if (trace.y[index] < trace.y[least]) least = index;
      if (trace.y[index] > trace.y[greatest]) greatest = index;
    }
    keep(Math.min(least, greatest));
    if (least !== greatest) keep(Math.max(least, greatest));
  }
  return { xUnit: trace.xUnit, yUnit: trace.yUnit, x, y };
}

/** Run boundaries, as indices from 0 to count, each run holding about as many points. */
function equalEdges(count: number, runs: number): number[] {
  return Array.from({ length: runs + 1 }, (_, run) => Math.round((run * count) / runs));
}

/**
 * Run boundaries that part log x evenly; where the points lie wider apart than the runs, a run holds one point, and the
 * runs saved that way are not given to others.
 */
function logarithmicEdges(x: ArrayLike<number>, runs: number): number[] {
  const count = x.length;
  const firstPositive = x[0] > 0 ? 0 : 1;
  const low = Math.log(x[firstPositive]);
  const step = (Math.log(x[count - 1]) - low) / runs;
  const edges = [0];
  let run = 1;
  for (let index = firstPositive; index < count; index++) {
    if (Math.log(x[index]) < low + run * step) continue;
    if (index > edges[edges.length - 1]) edges.push(index);
    while (run < runs && Math.log(x[index]) >= low + run * step) run++;
    if (run >= runs) break;
  }
  if (edges[edges.length - 1] < count) edges.push(count);
  return edges;
}
