import { useEffect, useLayoutEffect, useRef } from 'react';
import uPlot from 'uplot';
import 'uplot/dist/uPlot.min.css';
import type { Appearance } from '@/lib/theme';
import { drawChart } from './draw-chart';
import type { ChartScene } from './draw-context';
import { readPalette } from './palette';

interface ChartCanvasProps {
  scene: ChartScene;
  /** Repaints in the other theme's colours. */
  appearance: Appearance;
}

/** Scales and frame stay uPlot's own, so that its sizes, zoom ranges and repaints agree with what is drawn. */
function optionsFor(
  sceneRef: { readonly current: ChartScene },
  paint: (chart: uPlot) => void,
): uPlot.Options {
  const { geometry, model } = sceneRef.current;
  return {
    width: geometry.totalWidth,
    height: geometry.totalHeight,
    legend: { show: false },
    cursor: { show: false },
    padding: [
      () => sceneRef.current.geometry.top,
      () =>
        sceneRef.current.geometry.totalWidth -
        sceneRef.current.geometry.left -
        sceneRef.current.geometry.width,
      () =>
        sceneRef.current.geometry.totalHeight -
        sceneRef.current.geometry.top -
        sceneRef.current.geometry.height,
      () => sceneRef.current.geometry.left,
    ],
    scales: {
      x: {
        time: false,
        distr: model.x.scale === 'log' ? 3 : 1,
        range: () => [sceneRef.current.view.xMin, sceneRef.current.view.xMax],
      },
      y: { range: () => [sceneRef.current.view.yMin, sceneRef.current.view.yMax] },
    },
    axes: [{ show: false }, { show: false }],
    series: [{}, { show: false }],
    hooks: { draw: [paint] },
  };
}

function dataFor({ view }: ChartScene): uPlot.AlignedData {
  return [
    [view.xMin, view.xMax],
    [view.yMin, view.yMax],
  ];
}

/** Owns one uPlot: built on mount, resized and repainted as the scene changes, destroyed on unmount. */
export function ChartCanvas({ scene, appearance }: ChartCanvasProps) {
  const hostRef = useRef<HTMLDivElement>(null);
  const chartRef = useRef<uPlot>(null);
  const sceneRef = useRef(scene);
  const isLog = scene.model.x.scale === 'log';

  useLayoutEffect(() => {
    const host = hostRef.current;
    if (!host) return;
    const paint = ({ ctx }: uPlot) => {
      const pixelRatio = devicePixelRatio;
      ctx.save();
      ctx.setTransform(pixelRatio, 0, 0, pixelRatio, 0, 0);
      drawChart({ ...sceneRef.current, pen: ctx, palette: readPalette(host), pixelRatio });
      ctx.restore();
    };
    const chart = new uPlot(optionsFor(sceneRef, paint), dataFor(sceneRef.current), host);
    chartRef.current = chart;
    return () => {
      chart.destroy();
      chartRef.current = null;
    };
    // Only a change between log and linear needs another uPlot.
  }, [isLog]);

  useLayoutEffect(() => {
    sceneRef.current = scene;
    const chart = chartRef.current;
    if (!chart) return;
    const { totalWidth, totalHeight } = scene.geometry;
    if (chart.width !== totalWidth || chart.height !== totalHeight) {
      chart.setSize({ width: totalWidth, height: totalHeight });
    }
    chart.setData(dataFor(scene));
  }, [scene, appearance]);

  useEffect(() => {
    let isLive = true;
    // A canvas doesn't repaint by itself when a font arrives.
    void document.fonts.ready.then(() => {
      if (isLive) chartRef.current?.redraw();
    });
    return () => {
      isLive = false;
    };
  }, []);

  return <div ref={hostRef} className="bl-chart-canvas" aria-hidden="true" />;
}
