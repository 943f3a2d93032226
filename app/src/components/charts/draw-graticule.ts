import { type DrawContext, snap } from './draw-context';
import { strokeLine } from './draw-shapes';

const MINOR_PX = 0.6;

/** The plot's ground, the highlights, then minor and major lines: colour alone tells them apart. */
export function drawGround(context: DrawContext): void {
  const { pen, geometry, palette, model, scales } = context;
  const { left, top, width, height } = geometry;
  pen.beginPath();
  pen.rect(left, top, width, height);
  pen.fillStyle = palette.plot;
  pen.fill();
  for (const { fromX, toX } of model.highlights ?? []) {
    const start = Math.max(left, scales.x.toPx(fromX));
    const end = Math.min(left + width, scales.x.toPx(toX));
    if (end <= start) continue;
    pen.beginPath();
    pen.rect(start, top, end - start, height);
    pen.fillStyle = palette.highlight;
    pen.fill();
  }
}

export function drawGraticule(context: DrawContext): void {
  const { ticks, palette } = context;
  drawLines(context, ticks.x.minor, ticks.y.minor, palette.minor);
  drawLines(context, ticks.x.major, ticks.y.major, palette.major);
}

function drawLines(context: DrawContext, xs: readonly number[], ys: readonly number[], colour: string): void {
  const { geometry, scales, pixelRatio } = context;
  const { left, top, width, height } = geometry;
  const stroke = { colour, width: Math.max(1 / pixelRatio, MINOR_PX) };
  const isInside = (px: number, start: number, length: number) => px > start + 1 && px < start + length - 1;
  for (const value of xs) {
    const x = snap(scales.x.toPx(value), pixelRatio);
    if (isInside(x, left, width))
      strokeLine(
        context,
        [
          [x, top],
          [x, top + height],
        ],
        stroke,
      );
  }
  for (const value of ys) {
    const y = snap(scales.y.toPx(value), pixelRatio);
    if (isInside(y, top, height))
      strokeLine(
        context,
        [
          [left, y],
          [left + width, y],
        ],
        stroke,
      );
  }
}

/** Zero of a signed scale: one pixel in the frame's colour. */
export function drawZeroLine(context: DrawContext): void {
  const { geometry, scales, palette, pixelRatio, view } = context;
  if (!context.model.hasZeroLine || view.yMin > 0 || view.yMax < 0) return;
  const y = snap(scales.y.toPx(0), pixelRatio);
  strokeLine(
    context,
    [
      [geometry.left, y],
      [geometry.left + geometry.width, y],
    ],
    { colour: palette.frame, width: 1 },
  );
}
