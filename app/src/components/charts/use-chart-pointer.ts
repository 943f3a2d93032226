import { type PointerEvent, useState } from 'react';
import type { ViewRange } from './chart-model';
import type { ChartScene } from './draw-context';
import type { Box } from './occupancy';

export type ChartTool = 'cursor' | 'zoom';

/** A drag shorter than this is a click. */
const LEAST_DRAG_PX = 6;
/** A box lower than this zooms x alone. */
const LEAST_BOX_HEIGHT_PX = 14;

export interface ChartPointerWants {
  readonly scene: ChartScene | null;
  readonly tool: ChartTool;
  readonly onCursor: (x: number | null) => void;
  readonly onZoom: (range: ViewRange) => void;
}

/** The box between two corners, or the whole height where it is drawn flat. */
function boxBetween(start: Point, end: Point, { top, height }: ChartScene['geometry']): Box {
  const isFlat = Math.abs(end.y - start.y) < LEAST_BOX_HEIGHT_PX;
  return {
    x: Math.min(start.x, end.x),
    width: Math.abs(end.x - start.x),
    y: isFlat ? top : Math.min(start.y, end.y),
    height: isFlat ? height : Math.abs(end.y - start.y),
  };
}

interface Point {
  readonly x: number;
  readonly y: number;
}

function pointIn({ geometry }: ChartScene, event: PointerEvent<HTMLElement>): Point {
  const bounds = event.currentTarget.getBoundingClientRect();
  const { left, top, width, height } = geometry;
  return {
    x: Math.min(left + width, Math.max(left, event.clientX - bounds.left)),
    y: Math.min(top + height, Math.max(top, event.clientY - bounds.top)),
  };
}

/** Mouse: hovering reads, dragging zooms. Touch: dragging reads with Cursor, zooms with Zoom. */
export function useChartPointer({ scene, tool, onCursor, onZoom }: ChartPointerWants) {
  const [start, setStart] = useState<Point | null>(null);
  const [box, setBox] = useState<Box | null>(null);

  const end = () => {
    setStart(null);
    setBox(null);
  };
  return {
    box,
    handlers: {
      onPointerDown: (event: PointerEvent<HTMLElement>) => {
        if (!scene || event.button !== 0) return;
        const point = pointIn(scene, event);
        onCursor(scene.scales.x.fromPx(point.x));
        if (event.pointerType === 'mouse' || tool === 'zoom') {
          event.currentTarget.setPointerCapture(event.pointerId);
          setStart(point);
        }
      },
      onPointerMove: (event: PointerEvent<HTMLElement>) => {
        if (!scene) return;
        const point = pointIn(scene, event);
        if (!start) onCursor(scene.scales.x.fromPx(point.x));
        else if (box || Math.abs(point.x - start.x) >= LEAST_DRAG_PX)
          setBox(boxBetween(start, point, scene.geometry));
      },
      onPointerUp: () => {
        if (scene && box && box.width >= LEAST_DRAG_PX) {
          const { x, y } = scene.scales;
          onZoom({
            xMin: x.fromPx(box.x),
            xMax: x.fromPx(box.x + box.width),
            yMin: y.fromPx(box.y + box.height),
            yMax: y.fromPx(box.y),
          });
        }
        end();
      },
      onPointerCancel: end,
      onPointerLeave: (event: PointerEvent<HTMLElement>) => {
        if (event.pointerType === 'mouse' && !start) onCursor(null);
      },
    },
  };
}
