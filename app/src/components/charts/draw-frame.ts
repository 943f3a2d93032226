import { type DrawContext, snap } from './draw-context';
import { strokeLine } from './draw-shapes';
import { drawText } from './draw-text';
import { formatTick, tickDecimals } from './ticks';

const TICK_PX = 4;

/** Frame, ticks and the two axis names, none of them turned. */
export function drawFrame(context: DrawContext): void {
  drawBareFrame(context);
  const { geometry, palette, model } = context;
  const { left, top, width, height } = geometry;
  const name = { sizePx: 12, weight: 600 as const, colour: palette.ink2 };
  drawText(context, axisName(model.y), { ...name, x: 0, y: 13 });
  drawText(context, axisName(model.x), { ...name, x: left + width, y: top + height + 31, align: 'right' });
}

/** Frame with square corners, ticks outward and their labels. */
export function drawBareFrame(context: DrawContext): void {
  const { pen, geometry, palette, pixelRatio, model, ticks, scales } = context;
  const { left, top, width, height } = geometry;
  pen.setLineDash([]);
  pen.strokeStyle = palette.frame;
  pen.lineWidth = 1;
  pen.beginPath();
  const x0 = snap(left, pixelRatio);
  const y0 = snap(top, pixelRatio);
  pen.rect(x0, y0, snap(left + width, pixelRatio) - x0, snap(top + height, pixelRatio) - y0);
  pen.stroke();

  const tickStroke = { colour: palette.frame, width: 0.8 };
  const label = { sizePx: 11.5, isMono: true, colour: palette.ink2 };
  for (const value of ticks.x.major) {
    const x = snap(scales.x.toPx(value), pixelRatio);
    strokeLine(
      context,
      [
        [x, top + height],
        [x, top + height + TICK_PX],
      ],
      tickStroke,
    );
    drawText(context, formatTick(model.x, value), { ...label, x, y: top + height + 13, align: 'center' });
  }
  const decimals = tickDecimals(ticks.y.major);
  for (const value of ticks.y.major) {
    const y = snap(scales.y.toPx(value), pixelRatio);
    strokeLine(
      context,
      [
        [left - TICK_PX, y],
        [left, y],
      ],
      tickStroke,
    );
    drawText(context, formatTick(model.y, value, decimals), { ...label, x: left - 8, y, align: 'right' });
  }
}

/** "Level, dBFS" */
export function axisName({ quantity, unit }: { readonly quantity: string; readonly unit: string }): string {
  return unit === '' ? quantity : `${quantity}, ${unit}`;
}
