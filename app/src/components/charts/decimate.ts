import type { TraceKind } from './chart-model';

/** The points of a trace that are drawn; `count` says how many of its own stand behind each. */
export interface DrawnPoints {
  readonly x: Float64Array;
  readonly y: Float64Array;
  readonly count: Uint32Array;
}

/** How far above its neighbourhood a bin must stand to be drawn as a line, dB. */
export const LINE_ABOVE_DB = 12;
/** Columns at each side that make the neighbourhood. */
const NEIGHBOURS = 12;

/** Power ratio of one decibel, as an exponent of e: exp is quicker than a power of ten. */
const NEPERS_PER_DB = Math.LN10 / 10;

interface Columns {
  readonly x: ArrayLike<number>;
  readonly y: ArrayLike<number>;
  /** First and one past the last index in view. */
  readonly from: number;
  readonly to: number;
  /** Ascending edges in x, one more than there are columns. */
  readonly edges: Float64Array;
}

/** Index of the first x that is not below a value. */
export function lowerBound(x: ArrayLike<number>, value: number): number {
  let low = 0;
  let high = x.length;
  while (low < high) {
    const middle = (low + high) >>> 1;
    if ((x[middle] ?? Infinity) < value) low = middle + 1;
    else high = middle;
  }
  return low;
}

/**
 * Points to draw over a row of pixel columns. Spectra: the power mean of the bins under a column, the maximum only
 * where a line stands LINE_ABOVE_DB over its neighbourhood, so that noise keeps its level and lines their height.
 * Curves: first, least, greatest and last of a column, so that no peak is lost. One point at each side of the view
 * is kept, so that lines run on to the frame.
 */
export function decimate(
  trace: { readonly kind: TraceKind; readonly x: ArrayLike<number>; readonly y: ArrayLike<number> },
  edges: Float64Array,
): DrawnPoints {
  const { x, y } = trace;
  const from = Math.max(0, lowerBound(x, edges[0] ?? 0) - 1);
  const to = Math.min(x.length, lowerBound(x, edges[edges.length - 1] ?? 0) + 1);
  const columns: Columns = { x, y, from, to, edges };
  if (to - from <= edges.length - 1) return copyPoints(columns);
  return trace.kind === 'spectrum' || trace.kind === 'floor' ? meanWithLines(columns) : keepExtremes(columns);
}

function copyPoints({ x, y, from, to }: Columns): DrawnPoints {
  const length = Math.max(0, to - from);
  const points = {
    x: new Float64Array(length),
    y: new Float64Array(length),
    count: new Uint32Array(length).fill(1),
  };
  for (let index = 0; index < length; index += 1) {
    points.x[index] = x[from + index] ?? NaN;
    points.y[index] = y[from + index] ?? NaN;
  }
  return points;
}

interface Column {
  meanDb: number;
  maxDb: number;
  xOfMax: number;
  xMiddle: number;
  count: number;
}

function gatherColumns({ x, y, from, to, edges }: Columns): Column[] {
  const gathered: Column[] = [];
  let index = from;
  for (let edge = 0; edge < edges.length && index < to; edge += 1) {
    // The last pass takes what lies right of the view.
    const end = edge + 1 < edges.length ? (edges[edge + 1] ?? Infinity) : Infinity;
    let power = 0;
    let count = 0;
    let maxDb = -Infinity;
    let xOfMax = NaN;
    const xFirst = x[index] ?? NaN;
    let xLast = xFirst;
    for (; index < to && (x[index] ?? Infinity) < end; index += 1) {
      const level = y[index] ?? NaN;
      xLast = x[index] ?? xLast;
      if (Number.isNaN(level)) continue;
      power += Math.exp(level * NEPERS_PER_DB);
      count += 1;
      if (level > maxDb) {
        maxDb = level;
        xOfMax = xLast;
      }
    }
    if (count > 0) {
      gathered.push({
        meanDb: 10 * Math.log10(power / count),
        maxDb,
        xOfMax,
        xMiddle: (xFirst + xLast) / 2,
        count,
      });
    }
  }
  return gathered;
}

function medianAround(columns: readonly Column[], index: number): number {
  const window = columns
    .slice(Math.max(0, index - NEIGHBOURS), index + NEIGHBOURS + 1)
    .map(({ meanDb }) => meanDb);
  window.sort((a, b) => a - b);
  return window[window.length >>> 1] ?? -Infinity;
}

/** Whether a column's maximum stands over its neighbourhood; most are ruled out without sorting anything. */
function isLineAt(columns: readonly Column[], index: number): boolean {
  const { count, maxDb } = columns[index] ?? { count: 0, maxDb: -Infinity };
  if (count < 2) return false;
  let leastDb = Infinity;
  const last = Math.min(columns.length - 1, index + NEIGHBOURS);
  for (let at = Math.max(0, index - NEIGHBOURS); at <= last; at += 1) {
    leastDb = Math.min(leastDb, columns[at]?.meanDb ?? Infinity);
  }
  return maxDb - leastDb > LINE_ABOVE_DB && maxDb - medianAround(columns, index) > LINE_ABOVE_DB;
}

function meanWithLines(columns: Columns): DrawnPoints {
  const gathered = gatherColumns(columns);
  const points = {
    x: new Float64Array(gathered.length),
    y: new Float64Array(gathered.length),
    count: new Uint32Array(gathered.length),
  };
  gathered.forEach((column, index) => {
    const isLine = isLineAt(gathered, index);
    points.x[index] = isLine ? column.xOfMax : column.xMiddle;
    points.y[index] = isLine ? column.maxDb : column.meanDb;
    points.count[index] = isLine ? 1 : column.count;
  });
  return points;
}

function keepExtremes({ x, y, from, to, edges }: Columns): DrawnPoints {
  const kept: number[] = [];
  let index = from;
  for (let edge = 0; edge < edges.length && index < to; edge += 1) {
    const end = edge + 1 < edges.length ? (edges[edge + 1] ?? Infinity) : Infinity;
    const first = index;
    let least = index;
    let greatest = index;
    for (; index < to && (x[index] ?? Infinity) < end; index += 1) {
      if ((y[index] ?? NaN) < (y[least] ?? NaN)) least = index;
      if ((y[index] ?? NaN) > (y[greatest] ?? NaN)) greatest = index;
    }
    if (index === first) continue;
    kept.push(...[...new Set([first, least, greatest, index - 1])].sort((a, b) => a - b));
  }
  return {
    x: Float64Array.from(kept, (at) => x[at] ?? NaN),
    y: Float64Array.from(kept, (at) => y[at] ?? NaN),
    count: new Uint32Array(kept.length).fill(1),
  };
}
