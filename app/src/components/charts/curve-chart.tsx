import { useMemo } from 'react';
import { Chart, type ChartProps } from './chart';
import { curvesInWords } from './curve-words';

export type CurveChartProps = Omit<ChartProps, 'inWords'> & {
  /** Said before what is read off the curves: what they mean. */
  lead?: string;
};

/** Curves over any axis; what they are comes from the model alone. */
export function CurveChart({ lead, ...chart }: CurveChartProps) {
  const { model } = chart;
  const words = useMemo(() => curvesInWords(model), [model]);
  return <Chart {...chart} inWords={lead ? `${lead} ${words}` : words} />;
}
