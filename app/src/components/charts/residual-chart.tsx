import { useMemo } from 'react';
import { Chart } from './chart';
import type { ChartNote, Highlight } from './chart-model';
import type { ChartSource } from './chart-source';
import type { ChartState } from './chart-state';
import { type ResidualChannel, residualInWords, residualModel } from './residual-model';

export interface ResidualChartProps {
  title?: string;
  sub?: string;
  heightPx?: number;
  state?: ChartState;
  /** In the record's order: the first is slot 1. Keep the identity. */
  channels: readonly ResidualChannel[];
  /** Unit of the residual: "% of full scale". */
  yUnit: string;
  highlights?: readonly Highlight[];
  notes?: readonly ChartNote[];
  source: ChartSource;
}

/** What is left: the residual over the fundamental's phase, with the wave itself dotted behind it. */
export function ResidualChart(props: ResidualChartProps) {
  const { title = 'Residual over the wave', sub, heightPx = 214, state, source } = props;
  const { channels, yUnit, highlights, notes } = props;
  const model = useMemo(
    () => residualModel({ channels, yUnit, highlights, notes }),
    [channels, yUnit, highlights, notes],
  );
  const inWords = useMemo(() => residualInWords(channels, yUnit), [channels, yUnit]);
  return (
    <Chart
      title={title}
      sub={sub}
      heightPx={heightPx}
      state={state}
      source={source}
      model={model}
      inWords={inWords}
    />
  );
}
