import type { AxisModel, ChartModel, ViewRange } from './chart-model';
import type { Geometry } from './geometry';

export interface Scale {
  readonly toPx: (value: number) => number;
  readonly fromPx: (px: number) => number;
}

export interface ChartScales {
  readonly x: Scale;
  readonly y: Scale;
}

/** Maps [min, max] onto [fromPx, toPx]; log axes by the logarithm. */
export function makeScale(
  kind: AxisModel['scale'],
  min: number,
  max: number,
  startPx: number,
  endPx: number,
): Scale {
  const forward = kind === 'log' ? Math.log : (value: number) => value;
  const backward = kind === 'log' ? Math.exp : (value: number) => value;
  const low = forward(min);
  const perUnit = (endPx - startPx) / (forward(max) - low);
  return {
    toPx: (value) => startPx + (forward(value) - low) * perUnit,
    fromPx: (px) => backward(low + (px - startPx) / perUnit),
  };
}

export function makeScales(
  model: Pick<ChartModel, 'x' | 'y'>,
  view: ViewRange,
  geometry: Geometry,
): ChartScales {
  const { left, top, width, height } = geometry;
  return {
    x: makeScale(model.x.scale, view.xMin, view.xMax, left, left + width),
    y: makeScale(model.y.scale, view.yMin, view.yMax, top + height, top),
  };
}
