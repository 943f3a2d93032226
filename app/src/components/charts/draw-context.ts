import type { ChartModel, TraceModel, ViewRange } from './chart-model';
import type { DrawnPoints } from './decimate';
import type { Geometry } from './geometry';
import type { Palette } from './palette';
import type { MeasureText, Pen } from './pen';
import type { ChartScales } from './scales';
import type { Ticks } from './ticks';

export interface DrawnTrace {
  readonly trace: TraceModel;
  readonly points: DrawnPoints;
  /** Pixel positions of the points. */
  readonly px: Float64Array;
  readonly py: Float64Array;
}

/** All that the drawing needs, worked out beforehand; lengths are CSS pixels, the pen is scaled. */
export interface ChartScene {
  readonly model: ChartModel;
  readonly view: ViewRange;
  readonly geometry: Geometry;
  readonly scales: ChartScales;
  readonly ticks: { readonly x: Ticks; readonly y: Ticks };
  /** Traces that are shown, first on top. */
  readonly drawn: readonly DrawnTrace[];
  readonly measure: MeasureText;
}

export interface DrawContext extends ChartScene {
  readonly pen: Pen;
  readonly palette: Palette;
  /** Device pixels per CSS pixel: hairlines snap to it. */
  readonly pixelRatio: number;
}

/** The middle of the device pixel nearest to a position, so that a hairline is one pixel wide. */
export function snap(value: number, pixelRatio: number): number {
  return (Math.round(value * pixelRatio - 0.5) + 0.5) / pixelRatio;
}
