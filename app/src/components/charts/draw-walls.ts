import type { Wall } from './chart-model';
import type { DrawContext } from './draw-context';
import { clipToFrame, drawHatch, strokeLine } from './draw-shapes';
import { drawText } from './draw-text';

const WALL_BAND_PX = 18;

/** A tolerance is a wall: the limit, hatch behind it falling to the right, its words on it. No coloured areas. */
export function drawWalls(context: DrawContext): void {
  for (const wall of context.model.walls ?? []) drawWall(context, wall);
}

function drawWall(context: DrawContext, wall: Wall): void {
  const { pen, palette, scales, geometry } = context;
  const points = wall.x.map((x, index) => [scales.x.toPx(x), scales.y.toPx(wall.y[index] ?? NaN)] as const);
  const behind = wall.side === 'above' ? -WALL_BAND_PX : WALL_BAND_PX;
  const outline = () => {
    points.forEach(([x, y], index) => (index === 0 ? pen.moveTo(x, y) : pen.lineTo(x, y)));
    for (const [x, y] of [...points].reverse()) pen.lineTo(x, y + behind);
    pen.closePath();
  };
  drawHatch(context, outline, { colour: palette.mask, gap: 6, width: 0.6, isFalling: true });
  pen.save();
  clipToFrame(context);
  strokeLine(context, points, { colour: palette.mask, width: 1.1 });
  pen.restore();
  const first = points[0];
  if (!first || wall.words === '') return;
  drawText(context, wall.words, {
    sizePx: 12,
    colour: palette.ink2,
    x: Math.max(geometry.left, first[0]) + 10,
    y: first[1] + behind / 2,
    hasHalo: true,
  });
}
