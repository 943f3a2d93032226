import type { HarmonicMark } from './chart-model';
import type { ChartScene, DrawContext } from './draw-context';
import { drawMarker, strokeLine } from './draw-shapes';
import { drawText } from './draw-text';
import { traceColour } from './palette';

/** The ruler stands so far above the frame. */
const RULER_ABOVE_PX = 8;
const TICK_PX = 8;
const NUMBERED = new Set([1, 2, 3, 4, 5, 6, 7, 8, 10, 15, 20]);
const NUMBERED_INSIDE = new Set([1, 2, 3, 5, 10]);

/** One mark per order that lies in view: leaders and discs go with the channel, the ruler with the tone. */
function ordersInView({ model, view }: Pick<ChartScene, 'model' | 'view'>): HarmonicMark[] {
  const seen = new Map<string, HarmonicMark>();
  for (const mark of model.harmonics ?? []) {
    if (mark.x >= view.xMin && mark.x <= view.xMax && !seen.has(wordOf(mark))) seen.set(wordOf(mark), mark);
  }
  return [...seen.values()].sort((a, b) => a.x - b.x);
}

function wordOf({ label, order }: HarmonicMark): string {
  return label ?? String(order);
}

export function hasRuler(scene: Pick<ChartScene, 'model' | 'view'>): boolean {
  return ordersInView(scene).length > 0;
}

/** The ruler over the frame: a line from the first to the last order, ticks, numbers, its word. */
export function drawHarmonicRuler(context: DrawContext): void {
  const { geometry, scales, palette, measure } = context;
  const orders = ordersInView(context);
  const first = orders[0];
  const last = orders.at(-1);
  if (!first || !last) return;
  const y = geometry.top - RULER_ABOVE_PX;
  const stroke = { colour: palette.ink2, width: 0.8 };
  const start = scales.x.toPx(first.x);
  const end = scales.x.toPx(last.x);
  strokeLine(
    context,
    [
      [start, y],
      [end, y],
    ],
    stroke,
  );
  const numbered = geometry.isInside ? NUMBERED_INSIDE : NUMBERED;
  const number = { sizePx: 11, isMono: true, colour: palette.ink2, align: 'center' as const };
  let freeFrom = -Infinity;
  for (const mark of orders) {
    const { order, x, label } = mark;
    const text = wordOf(mark);
    const px = scales.x.toPx(x);
    strokeLine(
      context,
      [
        [px, y - TICK_PX / 2],
        [px, y + TICK_PX / 2],
      ],
      stroke,
    );
    const half = measure(text, number) / 2;
    if ((label === undefined && !numbered.has(order)) || px - half < freeFrom) continue;
    drawText(context, text, { ...number, x: px, y: y - 12 });
    freeFrom = px + half + 3;
  }
  const word = { sizePx: 11.5, colour: palette.ink2 };
  const rulerWord = context.model.rulerWord ?? 'harmonics';
  const isRoomLeft = start - measure(rulerWord, word) - 6 > geometry.left - 4;
  drawText(context, rulerWord, {
    ...word,
    x: isRoomLeft ? start - 6 : end + 6,
    y,
    align: isRoomLeft ? 'right' : 'left',
  });
}

/** From each harmonic clear of the floor a dotted leader falls to an open disc on its peak. */
export function drawHarmonicDiscs(context: DrawContext): void {
  const { geometry, scales, palette, model, view, drawn } = context;
  const shownSlots = new Set(
    drawn.filter(({ trace }) => trace.kind === 'spectrum').map(({ trace }) => trace.slot),
  );
  for (const { x, y, slot } of model.harmonics ?? []) {
    if (y === null || y < view.yMin || y > view.yMax || x < view.xMin || x > view.xMax) continue;
    if (!shownSlots.has(slot)) continue;
    const px = scales.x.toPx(x);
    const py = scales.y.toPx(y);
    strokeLine(
      context,
      [
        [px, geometry.top],
        [px, py - 3],
      ],
      { colour: palette.ink3, width: 0.8, dash: [1.2, 3.2] },
    );
    const colours = { stroke: traceColour(palette, slot), fill: palette.plot, width: 1.2 };
    drawMarker(context, 'disc', { x: px, y: py, radius: 2.8 }, colours);
  }
}
