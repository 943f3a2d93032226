import { useId, useMemo, useState } from 'react';
import { useTheme } from '@/lib/theme';
import './chart.css';
import { ChartCanvas } from './chart-canvas';
import type { ChartModel } from './chart-model';
import { ChartOverlay } from './chart-overlay';
import { ChartReadout } from './chart-readout';
import type { ChartSource } from './chart-source';
import { type ChartState, ChartStateWords } from './chart-state';
import { ChartTools, type ExportKind } from './chart-tools';
import { ChartTraces } from './chart-traces';
import { ChartWords } from './chart-words';
import { downloadBlob } from './download-blob';
import type { ChartScene } from './draw-context';
import type { Box } from './occupancy';
import { buildScene, measureWithCanvas } from './scene';
import { useChartCursor } from './use-chart-cursor';
import { useChartKeys } from './use-chart-keys';
import { type ChartTool, useChartPointer } from './use-chart-pointer';
import { useChartView } from './use-chart-view';
import { useWidth } from './use-width';

export interface ChartProps {
  title: string;
  /** Conditions in a few words beside the title. */
  sub?: string;
  /** Keep its identity (useMemo): a new model is worked out anew. */
  model: ChartModel;
  source: ChartSource;
  state?: ChartState;
  /** Fixed; the width follows the page. */
  heightPx: number;
  /** The chart in a sentence or two. */
  inWords: string;
  /** h2 in a section of its own, h3 within one. */
  headingLevel?: 2 | 3;
}

const READY: ChartState = { kind: 'ready' };

/** The chart that everything else uses: graticule, traces, cursor, zoom, exports, words. */
export function Chart(props: ChartProps) {
  const { title, sub = '', model, source, state = READY, heightPx, inWords, headingLevel = 2 } = props;
  const { appearance } = useTheme();
  const { ref, width } = useWidth<HTMLDivElement>();
  const [hiddenIds, setHiddenIds] = useState<ReadonlySet<string>>(new Set());
  const [tool, setTool] = useState<ChartTool>('cursor');
  const [areWordsOpen, setAreWordsOpen] = useState(false);
  const [exportFailure, setExportFailure] = useState<string | null>(null);
  const wordsId = useId();
  const chartView = useChartView(model);
  const { view } = chartView;
  const isReady = state.kind === 'ready';

  const scene = useMemo(() => {
    if (width === 0) return null;
    const shown = isReady ? model : { ...model, traces: [], harmonics: [], highlights: [], notes: [] };
    const pixelRatio = Math.min(2, window.devicePixelRatio || 1);
    return buildScene({
      model: shown,
      view,
      hiddenIds,
      width,
      height: heightPx,
      pixelRatio,
      measure: measureWithCanvas,
    });
  }, [model, view, hiddenIds, width, heightPx, isReady]);

  const cursor = useChartCursor(isReady ? scene : null);
  const keys = useChartKeys(cursor, chartView, chartView.zoomTo);
  const pointer = useChartPointer({
    scene: isReady ? scene : null,
    tool,
    onCursor: cursor.moveTo,
    onZoom: chartView.zoomTo,
  });

  const exportAs = async (kind: ExportKind) => {
    try {
      setExportFailure(null);
      downloadBlob(
        await makeExport(kind, { title, sub, model, view, hiddenIds, heightPx, source }),
        `${source.fileStem}.${kind}`,
      );
    } catch (error) {
      setExportFailure(error instanceof Error ? error.message : 'The reason is not known.');
    }
  };
  const toggle = (id: string) => {
    const next = new Set(hiddenIds);
    if (!next.delete(id)) next.add(id);
    setHiddenIds(next);
  };
  const Heading = headingLevel === 2 ? 'h2' : 'h3';
  return (
    <figure className="bl-chart" aria-label={title}>
      <div className="bl-chart-head">
        <Heading>{title}</Heading>
        {sub !== '' && <p>{sub}</p>}
        <ChartTools
          title={title}
          tool={tool}
          onTool={setTool}
          isZoomed={chartView.isZoomed}
          onReset={chartView.reset}
          onExport={(kind) => void exportAs(kind)}
          wordsId={wordsId}
          areWordsOpen={areWordsOpen}
          onWords={() => setAreWordsOpen(!areWordsOpen)}
          isDisabled={!isReady}
        />
      </div>
      <div
        ref={ref}
        className={`bl-chart-host bl-chart-tool-${tool}`}
        style={{ height: heightPx }}
        role="group"
        aria-roledescription="chart"
        aria-label={title}
        aria-describedby={isReady ? `${wordsId}-said` : undefined}
        tabIndex={isReady ? 0 : undefined}
        onKeyDown={keys.onKeyDown}
        onDoubleClick={chartView.reset}
        {...pointer.handlers}
      >
        {scene && <ChartCanvas scene={scene} appearance={appearance} />}
        {scene && isReady && (
          <ChartOverlay
            scene={scene}
            readout={cursor.readout}
            box={pointer.box ?? keyBox(scene, keys.anchorX, cursor.readout?.x)}
          />
        )}
        {scene && isReady && cursor.readout && <ChartReadout scene={scene} readout={cursor.readout} />}
        {!isReady && <ChartStateWords state={state} />}
      </div>
      <p id={`${wordsId}-said`} className="bl-hidden">
        {isReady && inWords}
      </p>
      <p className="bl-hidden" aria-live="polite">
        {cursor.spoken}
      </p>
      {isReady && model.traces.length > 1 && (
        <ChartTraces traces={model.traces} hiddenIds={hiddenIds} onToggle={toggle} />
      )}
      {exportFailure && (
        <p className="bl-form-error" role="alert">
          The export failed: {exportFailure}
        </p>
      )}
      {areWordsOpen && scene && isReady ? (
        <ChartWords id={wordsId} scene={scene} inWords={inWords} />
      ) : (
        <div id={wordsId} hidden />
      )}
    </figure>
  );
}

/** A zoom by keys is drawn as a band from where it began to the cursor. */
function keyBox(
  { geometry, scales }: ChartScene,
  anchorX: number | null,
  cursorX: number | undefined,
): Box | null {
  if (anchorX === null || cursorX === undefined) return null;
  const from = scales.x.toPx(anchorX);
  const to = scales.x.toPx(cursorX);
  return { x: Math.min(from, to), width: Math.abs(to - from), y: geometry.top, height: geometry.height };
}

/** Loaded when first asked for: most readers of a page export nothing. */
async function makeExport(
  kind: ExportKind,
  chart: Parameters<typeof import('./export-chart').exportPng>[0],
): Promise<Blob> {
  if (kind === 'csv') return (await import('./export-csv')).exportCsv(chart);
  const { exportPng, exportSvg } = await import('./export-chart');
  return kind === 'png' ? exportPng(chart) : exportSvg(chart);
}
