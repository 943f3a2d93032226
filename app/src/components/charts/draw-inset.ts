import type { Inset } from './chart-model';
import { wholeView } from './chart-model';
import type { DrawContext } from './draw-context';
import { drawBareFrame } from './draw-frame';
import { drawGraticule, drawGround } from './draw-graticule';
import { drawText } from './draw-text';
import { drawTraces } from './draw-traces';
import type { Geometry } from './geometry';
import type { Box, Occupancy } from './occupancy';
import { makeScales } from './scales';
import { columnEdges, drawnTrace } from './scene';
import { makeTicks } from './ticks';

/** A smaller plot has no room for a plot within it. */
const LEAST_PLOT_PX = { width: 460, height: 250 };
const SHARE = { width: 0.4, height: 0.52 };
/** From as large as it should be down to as small as can be read. */
const SCALES = [1, 0.9, 0.8, 0.7] as const;
const FROM_FRAME_PX = 10;
const PAD = { left: 44, right: 14, top: 28, bottom: 26 };
const TICK_GAP_PX = { x: 34, y: 26 };

/** A part of the chart drawn larger in an empty corner, its source outlined dotted. */
export function drawInset(context: DrawContext, occupancy: Occupancy): void {
  const { model, geometry, view } = context;
  const { inset } = model;
  if (!inset || geometry.width < LEAST_PLOT_PX.width || geometry.height < LEAST_PLOT_PX.height) return;
  const whole = wholeView(model);
  const isZoomed = (['xMin', 'xMax', 'yMin', 'yMax'] as const).some((edge) => view[edge] !== whole[edge]);
  if (isZoomed) return;
  const box = SCALES.map((scale) => emptyCorner(geometry, occupancy, scale)).find((found) => found !== null);
  if (!box) return;
  occupancy.take(box);
  outlineSource(context, inset);
  drawSheet(context, box, inset.title);
  const inner = innerContext(context, inset, box);
  drawGround(inner);
  drawGraticule(inner);
  drawTraces(inner);
  drawBareFrame(inner);
}

function emptyCorner(
  { left, top, width, height }: Geometry,
  occupancy: Occupancy,
  scale: number,
): Box | null {
  const size = {
    width: scale * Math.min(260, width * SHARE.width),
    height: scale * Math.min(210, height * SHARE.height),
  };
  const right = left + width - size.width - FROM_FRAME_PX;
  const bottom = top + height - size.height - FROM_FRAME_PX;
  const corners = [
    { x: left + FROM_FRAME_PX, y: bottom },
    { x: right, y: top + FROM_FRAME_PX },
    { x: left + FROM_FRAME_PX, y: top + FROM_FRAME_PX },
    { x: right, y: bottom },
  ].map((corner) => ({ ...corner, ...size }));
  return corners.find((corner) => occupancy.isFree(corner, 4)) ?? null;
}

function outlineSource({ pen, scales, palette, geometry }: DrawContext, { view }: Inset): void {
  const clampY = (py: number) => Math.min(geometry.top + geometry.height - 1, Math.max(geometry.top + 1, py));
  const left = Math.max(geometry.left + 1, scales.x.toPx(view.xMin));
  const right = Math.min(geometry.left + geometry.width - 1, scales.x.toPx(view.xMax));
  const top = clampY(scales.y.toPx(view.yMax));
  pen.strokeStyle = palette.ink3;
  pen.lineWidth = 1;
  pen.setLineDash([2, 2.5]);
  pen.beginPath();
  pen.rect(left, top, right - left, clampY(scales.y.toPx(view.yMin)) - top);
  pen.stroke();
  pen.setLineDash([]);
}

function drawSheet(context: DrawContext, box: Box, title: string): void {
  const { pen, palette } = context;
  pen.beginPath();
  pen.rect(box.x, box.y, box.width, box.height);
  pen.fillStyle = palette.plot;
  pen.fill();
  pen.strokeStyle = palette.frame;
  pen.lineWidth = 1;
  pen.stroke();
  const name = { sizePx: 12, weight: 600 as const, colour: palette.ink };
  drawText(context, title, { ...name, x: box.x + 12, y: box.y + 15 });
}

function innerContext(context: DrawContext, { view }: Inset, box: Box): DrawContext {
  const { model, pixelRatio } = context;
  const geometry: Geometry = {
    ...context.geometry,
    left: box.x + PAD.left,
    top: box.y + PAD.top,
    width: box.width - PAD.left - PAD.right,
    height: box.height - PAD.top - PAD.bottom,
  };
  const scales = makeScales(model, view, geometry);
  const edges = columnEdges(scales, geometry, pixelRatio);
  return {
    ...context,
    model: { ...model, highlights: [] },
    view,
    geometry,
    scales,
    ticks: {
      x: makeTicks(model.x, view.xMin, view.xMax, geometry.width, TICK_GAP_PX.x),
      y: makeTicks(model.y, view.yMin, view.yMax, geometry.height, TICK_GAP_PX.y),
    },
    drawn: context.drawn.map(({ trace }) => drawnTrace(trace, scales, edges)),
  };
}
