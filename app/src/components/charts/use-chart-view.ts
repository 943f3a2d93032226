import { useMemo, useState } from 'react';
import { type ChartModel, type ViewRange, wholeView } from './chart-model';
import { makeScale } from './scales';

/** Nobody needs to look closer than this share of the whole axis. */
const LEAST_SHARE = 1e-5;
/** One press of + or -. */
const KEY_ZOOM = 0.5;

export interface ChartView {
  readonly view: ViewRange;
  readonly isZoomed: boolean;
  readonly zoomTo: (range: ViewRange) => void;
  /** Closer (factor below 1) or further about a place on x. */
  readonly zoomAbout: (x: number, direction: 'closer' | 'further') => void;
  readonly reset: () => void;
}

type Span = readonly [number, number];

/** A span in axis shares (0 to 1), held within the whole and never too small. */
function holdSpan(from: number, to: number): Span {
  const size = Math.min(1, Math.max(LEAST_SHARE, Math.abs(to - from)));
  const start = Math.min(Math.max(0, Math.min(from, to)), 1 - size);
  return [start, start + size];
}

/** What part of the chart is shown. A new model with other ranges starts whole. */
export function useChartView(model: ChartModel): ChartView {
  const [zoomed, setZoomed] = useState<{ of: ViewRange; view: ViewRange } | null>(null);
  const whole = useMemo(() => wholeView(model), [model]);
  const { x: axisX, y: axisY } = model;
  const isCurrent =
    zoomed?.of.xMin === whole.xMin &&
    zoomed.of.xMax === whole.xMax &&
    zoomed.of.yMin === whole.yMin &&
    zoomed.of.yMax === whole.yMax;
  const view = zoomed && isCurrent ? zoomed.view : whole;
  const xShares = makeScale(axisX.scale, whole.xMin, whole.xMax, 0, 1);
  const yShares = makeScale(axisY.scale, whole.yMin, whole.yMax, 0, 1);

  function zoomTo(range: ViewRange): void {
    const [xFrom, xTo] = holdSpan(xShares.toPx(range.xMin), xShares.toPx(range.xMax));
    const [yFrom, yTo] = holdSpan(yShares.toPx(range.yMin), yShares.toPx(range.yMax));
    const next = {
      xMin: xShares.fromPx(xFrom),
      xMax: xShares.fromPx(xTo),
      yMin: yShares.fromPx(yFrom),
      yMax: yShares.fromPx(yTo),
    };
    const isWhole = xTo - xFrom >= 0.9999 && yTo - yFrom >= 0.9999;
    setZoomed(isWhole ? null : { of: whole, view: next });
  }

  function zoomAbout(x: number, direction: 'closer' | 'further'): void {
    const factor = direction === 'closer' ? KEY_ZOOM : 1 / KEY_ZOOM;
    const centre = xShares.toPx(x);
    const from = centre + (xShares.toPx(view.xMin) - centre) * factor;
    const to = centre + (xShares.toPx(view.xMax) - centre) * factor;
    zoomTo({ ...view, xMin: xShares.fromPx(from), xMax: xShares.fromPx(to) });
  }

  return { view, isZoomed: view !== whole, zoomTo, zoomAbout, reset: () => setZoomed(null) };
}
