import { type KeyboardEvent, useState } from 'react';
import type { ViewRange } from './chart-model';
import type { ChartCursor } from './use-chart-cursor';
import type { ChartView } from './use-chart-view';

const BIG_STEP = 10;

/** Keys of a chart that has the focus; the help of keys lists them. */
export function useChartKeys(cursor: ChartCursor, chartView: ChartView, onZoom: (range: ViewRange) => void) {
  /** Where a zoom by keys began. */
  const [anchorX, setAnchorX] = useState<number | null>(null);
  const here = cursor.readout?.x ?? null;

  function takeZoom(): void {
    if (anchorX !== null && here !== null && anchorX !== here) {
      onZoom({ ...chartView.view, xMin: Math.min(anchorX, here), xMax: Math.max(anchorX, here) });
    }
    setAnchorX(null);
  }

  function act(key: string, isShifted: boolean): boolean {
    const { view } = chartView;
    const middle = here ?? (view.xMin + view.xMax) / 2;
    switch (key) {
      case 'arrowleft':
        cursor.step(isShifted ? -BIG_STEP : -1);
        return true;
      case 'arrowright':
        cursor.step(isShifted ? BIG_STEP : 1);
        return true;
      case 'home':
        cursor.toEnd('first');
        return true;
      case 'end':
        cursor.toEnd('last');
        return true;
      case 'n':
        cursor.toHarmonic(isShifted ? -1 : 1);
        return true;
      case 'z':
        setAnchorX(here);
        return true;
      case 'enter':
        takeZoom();
        return anchorX !== null;
      case '+':
      case '=':
        chartView.zoomAbout(middle, 'closer');
        return true;
      case '-':
        chartView.zoomAbout(middle, 'further');
        return true;
      case '0':
        chartView.reset();
        return true;
      case 'escape':
        if (anchorX !== null) setAnchorX(null);
        else if (here !== null) cursor.moveTo(null);
        else return false;
        return true;
      default:
        return false;
    }
  }

  return {
    anchorX,
    onKeyDown: (event: KeyboardEvent<HTMLElement>) => {
      if (event.ctrlKey || event.metaKey || event.altKey || event.target !== event.currentTarget) return;
      if (act(event.key.toLowerCase(), event.shiftKey)) event.preventDefault();
    },
  };
}
