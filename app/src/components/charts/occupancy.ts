import type { DrawnTrace } from './draw-context';
import type { Geometry } from './geometry';

export interface Box {
  readonly x: number;
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Which part of each pixel column the traces take, so that words find an empty spot. */
export interface Occupancy {
  readonly isFree: (box: Box, padding: number) => boolean;
  /** Marks a box as taken. */
  readonly take: (box: Box) => void;
}

export function makeOccupancy(drawn: readonly DrawnTrace[], geometry: Geometry): Occupancy {
  const { left, top, width, height } = geometry;
  const columnCount = Math.ceil(width) + 1;
  const lows = drawn.map(() => new Float64Array(columnCount).fill(Infinity));
  const highs = drawn.map(() => new Float64Array(columnCount).fill(-Infinity));
  const taken: Box[] = [];

  drawn.forEach(({ px, py, trace }, traceIndex) => {
    const low = lows[traceIndex];
    const high = highs[traceIndex];
    if (!low || !high) return;
    // The floor's hatch hangs below its line.
    const below = trace.kind === 'floor' ? 17 : 0;
    for (let index = 1; index < px.length; index += 1) {
      const y0 = py[index - 1] ?? NaN;
      const y1 = py[index] ?? NaN;
      if (Number.isNaN(y0) || Number.isNaN(y1)) continue;
      const x0 = (px[index - 1] ?? 0) - left;
      const x1 = (px[index] ?? 0) - left;
      const from = Math.max(0, Math.floor(x0));
      const to = Math.min(columnCount - 1, Math.ceil(x1));
      // A long slanting stretch takes of each column only what it crosses there.
      const yAt = (x: number) =>
        x1 > x0 ? y0 + (y1 - y0) * Math.min(1, Math.max(0, (x - x0) / (x1 - x0))) : y0;
      for (let column = from; column <= to; column += 1) {
        const ya = x1 - x0 > 2 ? yAt(column - 1) : y0;
        const yb = x1 - x0 > 2 ? yAt(column + 1) : y1;
        low[column] = Math.min(low[column] ?? Infinity, ya, yb);
        high[column] = Math.max(high[column] ?? -Infinity, ya + below, yb + below);
      }
    }
  });

  function isFree(box: Box, padding: number): boolean {
    const { x, y } = box;
    if (
      x < left + 4 ||
      y < top + 3 ||
      x + box.width > left + width - 4 ||
      y + box.height > top + height - 3
    ) {
      return false;
    }
    const from = Math.max(0, Math.floor(x - padding - left));
    const to = Math.min(columnCount - 1, Math.ceil(x + box.width + padding - left));
    const crossesTrace = lows.some((low, traceIndex) => {
      const high = highs[traceIndex];
      for (let column = from; column <= to; column += 1) {
        if (
          (low[column] ?? Infinity) <= y + box.height + padding &&
          (high?.[column] ?? -Infinity) >= y - padding
        ) {
          return true;
        }
      }
      return false;
    });
    return !crossesTrace && !taken.some((other) => overlaps(box, other, padding));
  }

  return { isFree, take: (box) => void taken.push(box) };
}

function overlaps(a: Box, b: Box, padding: number): boolean {
  return (
    a.x < b.x + b.width + padding &&
    b.x < a.x + a.width + padding &&
    a.y < b.y + b.height + padding &&
    b.y < a.y + a.height + padding
  );
}

/** The free spot nearest to a point for words of a size: rings of growing radius, sixteen directions. */
export function findSpotNear(
  occupancy: Occupancy,
  point: { readonly x: number; readonly y: number },
  size: { readonly width: number; readonly height: number },
  farthestPx: number,
): Box | null {
  for (let radius = 16; radius <= farthestPx; radius += 8) {
    for (let step = 0; step < 16; step += 1) {
      // Up and to the sides first: words above a line are read with it.
      const angle = ((step % 2 === 0 ? step : -step - 1) * Math.PI) / 16 - Math.PI / 2;
      const x = point.x + Math.cos(angle) * radius;
      const y = point.y + Math.sin(angle) * radius - size.height / 2;
      const box = { x: Math.cos(angle) < -0.01 ? x - size.width : x, y, ...size };
      if (occupancy.isFree(box, 4)) return box;
    }
  }
  return null;
}
