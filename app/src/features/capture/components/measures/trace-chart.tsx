import type { ChartModel } from '@/components/charts/chart-model';
import { CurveChart } from '@/components/charts/curve-chart';
import { useMemo } from 'react';
import { useTraces } from '../../hooks/use-traces';
import type { ReadTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { chartStateOf } from './chart-state-of';
import { useChartSource } from './use-chart-source';

interface TraceChartProps {
  view: BodyView;
  /** The traces that are fetched for it; keep the identity. */
  names: readonly string[];
  /** Draws them; nothing while they come. Keep the identity (useCallback). */
  build: (traces: readonly ReadTrace[]) => ChartModel;
  title: string;
  sub?: string;
  heightPx: number;
  /** What an export of it is called. */
  stem: string;
  /** Said when the traces hold no point. */
  emptyWords?: string;
  lead?: string;
}

/** A chart of a body's own traces with its loading, failed and empty form. */
export function TraceChart({ view, names, build, stem, emptyWords, ...chart }: TraceChartProps) {
  const traces = useTraces(view.body, names);
  const model = useMemo(() => build(traces.kind === 'ready' ? traces.traces : []), [traces, build]);
  const source = useChartSource(view, stem);
  return <CurveChart {...chart} model={model} source={source} state={chartStateOf(traces, emptyWords)} />;
}
