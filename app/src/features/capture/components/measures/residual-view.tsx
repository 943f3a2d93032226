import { useMemo } from 'react';
import { ResidualChart } from '@/components/charts/residual-chart';
import { channelName } from '@/lib/capture-words';
import { useTraces } from '../../hooks/use-traces';
import { tracesNamed } from '../../model/read-trace';
import { residualScale } from '@/components/charts/residual-scale';
import type { BodyView } from './body-view';
import { chartStateOf } from './chart-state-of';
import { useChartSource } from './use-chart-source';

const NAMES = ['residual', 'wave'] as const;

/** What is left of a tone over one of its periods, the wave itself behind it. */
export function ResidualView({ view }: { view: BodyView }) {
  const read = useTraces(view.body, NAMES);
  const yUnit = view.body.channels.find(({ traces }) => traces['residual'])?.traces['residual']?.yUnit ?? '';
  const { channels, unit } = useMemo(() => {
    if (read.kind !== 'ready') return { channels: [], unit: yUnit };
    const residuals = tracesNamed(read.traces, 'residual');
    const waves = tracesNamed(read.traces, 'wave');
    const scale = residualScale(
      yUnit,
      residuals.map(({ trace }) => trace.y),
    );
    const scaled = residuals.map(({ channel, trace }) => ({
      name: channelName(channel),
      x: trace.x,
      residual: trace.y.map((value) => value * scale.factor),
      wave:
        waves.find((one) => one.channel === channel)?.trace.y.map((value) => value * scale.factor) ?? null,
    }));
    return { channels: scaled, unit: scale.unit };
  }, [read, yUnit]);
  const source = useChartSource(view, 'residual');
  return (
    <ResidualChart
      sub="one period, averaged, fundamental removed"
      state={chartStateOf(read)}
      channels={channels}
      yUnit={unit}
      source={source}
    />
  );
}
