import type { DrawContext, DrawnTrace } from './draw-context';
import { clipToFrame, drawHatch, drawMarker } from './draw-shapes';
import { styleOf } from './trace-style';

const FLOOR_BAND_PX = 17;

function tracePath({ pen }: Pick<DrawContext, 'pen'>, { px, py }: DrawnTrace): void {
  let isDown = false;
  for (let index = 0; index < px.length; index += 1) {
    const x = px[index] ?? NaN;
    const y = py[index] ?? NaN;
    if (Number.isNaN(y)) isDown = false;
    else if (isDown) pen.lineTo(x, y);
    else {
      pen.moveTo(x, y);
      isDown = true;
    }
  }
}

/** The rig alone, as earth is drawn in a section: its own thin line and a hatched band under it. */
function drawFloorBand(context: DrawContext, drawn: DrawnTrace): void {
  const { pen, palette } = context;
  const { px, py } = drawn;
  const outline = () => {
    tracePath(context, drawn);
    for (let index = px.length - 1; index >= 0; index -= 1) {
      const y = py[index] ?? NaN;
      if (!Number.isNaN(y)) pen.lineTo(px[index] ?? NaN, y + FLOOR_BAND_PX);
    }
    pen.closePath();
  };
  drawHatch(context, outline, { colour: palette.floor, gap: 5, width: 0.7, isFalling: false });
}

function drawTrace(context: DrawContext, drawn: DrawnTrace): void {
  const { pen, palette, view } = context;
  const style = styleOf(drawn.trace, palette);
  pen.beginPath();
  tracePath(context, drawn);
  pen.strokeStyle = style.colour;
  pen.lineWidth = style.width;
  pen.lineJoin = 'round';
  pen.setLineDash([...style.dash]);
  pen.stroke();
  pen.setLineDash([]);
  const { marker } = style;
  if (!marker) return;
  drawn.points.x.forEach((x, index) => {
    const y = drawn.py[index] ?? NaN;
    if (Number.isNaN(y) || x < view.xMin || x > view.xMax) return;
    const fill = marker.isHollow ? palette.plot : style.colour;
    drawMarker(
      context,
      marker.shape,
      { x: drawn.px[index] ?? 0, y, radius: 3.2 },
      { stroke: style.colour, fill },
    );
  });
}

/** The floors first, then the traces last to first, all within the frame. */
export function drawTraces(context: DrawContext): void {
  const { pen, drawn } = context;
  pen.save();
  clipToFrame(context);
  const backToFront = [...drawn].reverse();
  for (const item of backToFront.filter(({ trace }) => trace.kind === 'floor')) {
    drawFloorBand(context, item);
    drawTrace(context, item);
  }
  for (const item of backToFront.filter(({ trace }) => trace.kind !== 'floor')) drawTrace(context, item);
  pen.restore();
}
