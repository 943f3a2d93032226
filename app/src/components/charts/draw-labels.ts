import type { DrawContext, DrawnTrace } from './draw-context';
import { drawMarker, strokeLine } from './draw-shapes';
import { drawText } from './draw-text';
import { findSpotNear, type Occupancy } from './occupancy';
import { spreadLabels } from './spread-labels';
import { styleOf } from './trace-style';

const NAME = { sizePx: 12.5, weight: 600 as const };
const SUB = { sizePx: 11.5 };
const ONE_LINE_PX = 17;
const TWO_LINES_PX = 31;
/** A noisy trace's end is the mean of its last points. */
const END_POINTS = 8;

function heightAtRightEnd({ py, trace }: DrawnTrace, { top, height }: DrawContext['geometry']): number {
  const finite = [...py.subarray(-END_POINTS - 24)].filter((value) => !Number.isNaN(value));
  const tail =
    trace.kind === 'spectrum' || trace.kind === 'floor' ? finite.sort((a, b) => a - b) : finite.slice(-1);
  // Of a spectrum the median: a line at the very end would drag a mean about.
  const y = tail[tail.length >>> 1] ?? top + height;
  return Math.min(top + height, Math.max(top, y));
}

/** Names at the right ends, tied by an elbow in the trace's dash and marker, spread so that none overlap. */
export function drawRightLabels(context: DrawContext): void {
  const { geometry, palette, drawn } = context;
  const { left, top, width, height } = geometry;
  const ends = drawn.map((item) => heightAtRightEnd(item, geometry));
  const wishes = drawn.map(({ trace }, index) => ({
    wanted: ends[index] ?? top,
    height: trace.sub ? TWO_LINES_PX : ONE_LINE_PX,
  }));
  const middles = spreadLabels(wishes, top - ONE_LINE_PX / 2 + 4, top + height + ONE_LINE_PX / 2);
  drawn.forEach(({ trace }, index) => {
    const style = styleOf(trace, palette);
    const x = left + width;
    const end = ends[index] ?? top;
    const y = (middles[index] ?? end) - (trace.sub ? (TWO_LINES_PX - ONE_LINE_PX) / 2 : 0);
    const dash = style.dash.map((length) => length * 0.7);
    strokeLine(
      context,
      [
        [x + 1, end],
        [x + 9, y],
        [x + 20, y],
      ],
      { colour: style.colour, width: 1.2, dash },
    );
    if (style.marker) {
      const fill = style.marker.isHollow ? palette.paper : style.colour;
      drawMarker(context, style.marker.shape, { x: x + 20, y, radius: 3.2 }, { stroke: style.colour, fill });
    }
    const textX = x + (style.marker ? 29 : 25);
    drawText(context, trace.name, { ...NAME, x: textX, y, colour: style.textColour });
    if (trace.sub) drawText(context, trace.sub, { ...SUB, x: textX, y: y + 14, colour: palette.ink2 });
  });
}

/** In a narrow plot the names stand inside, each in the emptiest spot near its trace, tied by a leader and a dot. */
export function drawInsideLabels(context: DrawContext, occupancy: Occupancy): void {
  const { palette, drawn, measure } = context;
  for (const item of drawn) {
    const style = styleOf(item.trace, palette);
    const size = { width: measure(item.trace.name, NAME), height: ONE_LINE_PX };
    const found = findLabelSpot(context, occupancy, item, size);
    if (!found) continue;
    const { spot, point } = found;
    occupancy.take(spot);
    const y = spot.y + ONE_LINE_PX / 2;
    const nearX = point.x < spot.x ? spot.x - 3 : Math.min(point.x, spot.x + spot.width + 3);
    const nearY =
      point.x < spot.x || point.x > spot.x + spot.width ? y : point.y > y ? spot.y + ONE_LINE_PX : spot.y;
    strokeLine(
      context,
      [
        [point.x, point.y],
        [nearX, nearY],
      ],
      { colour: style.colour, width: 0.8 },
    );
    drawMarker(
      context,
      'disc',
      { ...point, radius: 1.7 },
      { stroke: style.colour, fill: style.colour, width: 0.5 },
    );
    drawText(context, item.trace.name, { ...NAME, x: spot.x, y, colour: style.textColour, hasHalo: true });
  }
}

interface LabelSpot {
  readonly spot: { readonly x: number; readonly y: number; readonly width: number; readonly height: number };
  readonly point: { readonly x: number; readonly y: number };
}

/** Tries points along the trace, right end first, and takes the one whose free spot is nearest. */
function findLabelSpot(
  { geometry }: DrawContext,
  occupancy: Occupancy,
  { px, py }: DrawnTrace,
  size: { readonly width: number; readonly height: number },
): LabelSpot | null {
  let best: (LabelSpot & { distance: number }) | null = null;
  for (let share = 0.92; share > 0.05; share -= 0.06) {
    const index = Math.min(px.length - 1, Math.floor(share * px.length));
    const point = { x: px[index] ?? NaN, y: py[index] ?? NaN };
    const isInFrame = point.y > geometry.top && point.y < geometry.top + geometry.height;
    if (Number.isNaN(point.y) || !isInFrame || point.x < geometry.left) continue;
    const spot = findSpotNear(occupancy, point, size, 120);
    if (!spot) continue;
    const distance = Math.hypot(spot.x + size.width / 2 - point.x, spot.y + size.height / 2 - point.y);
    if (!best || distance < best.distance) best = { spot, point, distance };
  }
  return best;
}
