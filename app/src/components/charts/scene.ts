import type { ChartModel, TraceModel, ViewRange } from './chart-model';
import { decimate } from './decimate';
import type { ChartScene, DrawnTrace } from './draw-context';
import { axisName } from './draw-frame';
import { hasRuler } from './draw-harmonics';
import { type Geometry, layOut } from './geometry';
import { fontOf, type MeasureText } from './pen';
import { type ChartScales, makeScales } from './scales';
import { makeTicks } from './ticks';

export interface SceneWants {
  readonly model: ChartModel;
  readonly view: ViewRange;
  readonly hiddenIds: ReadonlySet<string>;
  readonly width: number;
  readonly height: number;
  /** Columns per CSS pixel to decimate to. */
  readonly pixelRatio: number;
  readonly measure: MeasureText;
}

const X_LABEL_GAP_PX = 34;
const Y_LABEL_GAP_PX = 30;
const NAME = { sizePx: 12.5, weight: 600 as const };

/** Works out everything that is drawn, without drawing: layout, scales, ticks, points under each pixel. */
export function buildScene(wants: SceneWants): ChartScene {
  const { model, view, measure } = wants;
  const names = [...model.traces, ...(model.labelRoom ?? []).map((name) => ({ name, sub: undefined }))];
  const labelWidth = Math.max(0, ...names.map(({ name, sub }) => widestLine(measure, name, sub)));
  const { isSquare } = model;
  const size = { totalWidth: wants.width, totalHeight: wants.height, labelWidth, isSquare };
  const oneRow = layOut({ ...size, hasTwoRows: false });
  const hasTwoRows = hasRuler({ model, view }) && rulerMeetsName(wants, oneRow);
  const geometry = hasTwoRows ? layOut({ ...size, hasTwoRows }) : oneRow;
  const scales = makeScales(model, view, geometry);
  const shown = model.traces.filter(({ id }) => !wants.hiddenIds.has(id));
  const edges = columnEdges(scales, geometry, wants.pixelRatio);
  return {
    model,
    view,
    geometry,
    scales,
    ticks: {
      x: makeTicks(model.x, view.xMin, view.xMax, geometry.width, X_LABEL_GAP_PX),
      y: makeTicks(model.y, view.yMin, view.yMax, geometry.height, Y_LABEL_GAP_PX),
    },
    drawn: shown.map((trace) => drawnTrace(trace, scales, edges)),
    measure,
  };
}

function widestLine(measure: MeasureText, name: string, sub: string | undefined): number {
  return Math.max(measure(name, NAME), sub ? measure(sub, { sizePx: 11.5 }) : 0);
}

/** The ruler's first number would stand on the vertical axis's name. */
function rulerMeetsName({ model, view, measure }: SceneWants, geometry: Geometry): boolean {
  const inView = (model.harmonics ?? []).map(({ x }) => x).filter((x) => x >= view.xMin && x <= view.xMax);
  const start = makeScales(model, view, geometry).x.toPx(Math.min(...inView));
  return start < measure(axisName(model.y), { sizePx: 12, weight: 600 }) + 16;
}

/** Edges of the pixel columns in the unit of x. */
export function columnEdges(
  scales: ChartScales,
  { left, width }: Geometry,
  pixelRatio: number,
): Float64Array {
  const columnCount = Math.max(1, Math.round(width * pixelRatio));
  return Float64Array.from({ length: columnCount + 1 }, (_, index) =>
    scales.x.fromPx(left + (index / columnCount) * width),
  );
}

/** One trace with the points that are drawn and where they stand. */
export function drawnTrace(trace: TraceModel, scales: ChartScales, edges: Float64Array): DrawnTrace {
  const points = decimate(trace, edges);
  return { trace, points, px: points.x.map(scales.x.toPx), py: points.y.map(scales.y.toPx) };
}

let measuringPen: CanvasRenderingContext2D | null = null;

/** Text widths by the browser's own fonts. */
export const measureWithCanvas: MeasureText = (text, style) => {
  measuringPen ??= document.createElement('canvas').getContext('2d');
  if (!measuringPen) return text.length * style.sizePx * 0.55;
  measuringPen.font = fontOf(style);
  return measuringPen.measureText(text).width;
};
