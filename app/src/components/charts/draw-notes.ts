import type { ChartNote, Highlight } from './chart-model';
import type { DrawContext } from './draw-context';
import { drawMarker, strokeLine } from './draw-shapes';
import { drawText } from './draw-text';
import { findSpotNear, type Occupancy } from './occupancy';

const LINE_PX = 15;
const MOST_NOTES = 2;
const END_PX = 4;

/** Words tied to a point by a dot and a straight leader, in a free spot near it. */
export function drawNotes(context: DrawContext, occupancy: Occupancy): void {
  for (const note of (context.model.notes ?? []).slice(0, MOST_NOTES)) drawNote(context, occupancy, note);
}

function drawNote(context: DrawContext, occupancy: Occupancy, note: ChartNote): void {
  const { scales, view, palette, measure } = context;
  if (note.x < view.xMin || note.x > view.xMax || note.y < view.yMin || note.y > view.yMax) return;
  const point = { x: scales.x.toPx(note.x), y: scales.y.toPx(note.y) };
  const styles = [
    { sizePx: 12, weight: 600 as const },
    { sizePx: 12, weight: 400 as const },
  ];
  const width = Math.max(...note.lines.map((line, index) => measure(line, styles[index] ?? { sizePx: 12 })));
  const spot = findSpotNear(occupancy, point, { width, height: note.lines.length * LINE_PX }, 180);
  if (!spot) return;
  occupancy.take(spot);
  const isRight = spot.x >= point.x;
  const x = isRight ? spot.x : spot.x + spot.width;
  const leaderEnd = [x + (isRight ? -4 : 4), spot.y + LINE_PX / 2] as const;
  strokeLine(context, [[point.x, point.y], leaderEnd], { colour: palette.ink, width: 0.8 });
  drawMarker(
    context,
    'disc',
    { ...point, radius: 1.7 },
    { stroke: palette.ink, fill: palette.ink, width: 0.5 },
  );
  note.lines.forEach((line, index) => {
    const y = spot.y + LINE_PX / 2 + index * LINE_PX;
    const style = styles[index] ?? { sizePx: 12 };
    drawText(context, line, {
      ...style,
      x,
      y,
      colour: palette.ink,
      align: isRight ? 'left' : 'right',
      hasHalo: true,
    });
  });
}

/** A dimension line across a highlighted place, as on a drawing, its words over it. */
export function drawDimensions(context: DrawContext): void {
  const { geometry, palette } = context;
  const y = geometry.top + geometry.height - 9;
  for (const highlight of context.model.highlights ?? []) {
    const span = clampToFrame(context, highlight);
    if (!highlight.words || !span) continue;
    const [start, end] = span;
    const stroke = { colour: palette.ink2, width: 0.8 };
    strokeLine(
      context,
      [
        [start, y - END_PX],
        [start, y + END_PX],
      ],
      stroke,
    );
    strokeLine(
      context,
      [
        [end, y - END_PX],
        [end, y + END_PX],
      ],
      stroke,
    );
    strokeLine(
      context,
      [
        [start, y],
        [end, y],
      ],
      stroke,
    );
    drawText(context, highlight.words, {
      sizePx: 12,
      colour: palette.ink2,
      x: (start + end) / 2,
      y: y - 9,
      align: 'center',
      hasHalo: true,
    });
  }
}

function clampToFrame({ geometry, scales }: DrawContext, { fromX, toX }: Highlight): [number, number] | null {
  const start = Math.max(geometry.left, scales.x.toPx(fromX));
  const end = Math.min(geometry.left + geometry.width, scales.x.toPx(toX));
  return end > start ? [start, end] : null;
}

export function drawCornerWords(context: DrawContext): void {
  const { geometry, model, palette } = context;
  if (!model.cornerWords) return;
  drawText(context, model.cornerWords, {
    sizePx: 12,
    colour: palette.ink2,
    x: geometry.left + 10,
    y: geometry.top + geometry.height - 12,
    hasHalo: true,
  });
}
