import { markerPath } from './marker-path';
import type { ChartScene } from './draw-context';
import type { Box } from './occupancy';
import type { Readout } from './readout';

interface ChartOverlayProps {
  scene: ChartScene;
  readout: Readout | null;
  /** A zoom box being drawn, by pointer or keys. */
  box: Box | null;
}

/** Cursor line, an open marker on each trace, the zoom box: over the canvas, so that moving them repaints nothing. */
export function ChartOverlay({ scene, readout, box }: ChartOverlayProps) {
  const { left, top, width, height, totalWidth, totalHeight } = scene.geometry;
  const x = readout ? scene.scales.x.toPx(readout.x) : NaN;
  const isInside = x >= left - 1 && x <= left + width + 1;
  return (
    <svg className="bl-chart-overlay" width={totalWidth} height={totalHeight} aria-hidden="true">
      {readout && isInside && (
        <>
          <line className="bl-chart-cursor" x1={x} x2={x} y1={top} y2={top + height} />
          {readout.rows.map(({ trace, x: atX, y }) => {
            const py = scene.scales.y.toPx(y);
            if (py < top || py > top + height) return null;
            return (
              <path
                key={trace.id}
                className={`bl-chart-dot bl-chart-${trace.kind} bl-chart-slot-${trace.slot}`}
                d={markerPath(trace.slot, scene.scales.x.toPx(atX), py)}
              />
            );
          })}
        </>
      )}
      {box && <rect className="bl-chart-box" x={box.x} y={box.y} width={box.width} height={box.height} />}
    </svg>
  );
}
