import type { ChartState } from '@/components/charts/chart-state';
import { ResidualChart } from '@/components/charts/residual-chart';
import { SpectrumChart } from '@/components/charts/spectrum-chart';
import type { Capture } from '@/lib/api-schema';
import { channelName } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatBytes, formatPoints } from '@/lib/format/quantity';
import { useMemo } from 'react';
import type { ServedRecord, ServedRecordDetail } from '../api/record-queries';
import { useTraces } from '../hooks/use-traces';
import type { TracesState } from '../hooks/use-traces';
import { conditionsLine } from '../model/record-words';
import { residualScale } from '../model/residual-scale';

export interface RecordChartsProps {
  capture: Capture;
  detail: ServedRecordDetail;
}

/** The spectrum over the residual on the wave, as far as the record has them. */
export function RecordCharts({ capture, detail }: RecordChartsProps) {
  const { record } = detail;
  const hasTrace = (name: string) => record.channels.some(({ traces }) => name in traces);
  return (
    <>
      {hasTrace('spectrum') && <Spectrum capture={capture} detail={detail} />}
      {hasTrace('residual') && <Residual capture={capture} detail={detail} />}
    </>
  );
}

function Spectrum({ capture, detail }: RecordChartsProps) {
  const { record } = detail;
  const spectrum = useTraces(record, 'spectrum');
  const channels = useMemo(
    () =>
      spectrum.kind === 'ready'
        ? spectrum.traces.map(({ channel, trace }) => ({
            name: channelName(channel),
            x: trace.x,
            y: trace.y,
          }))
        : [],
    [spectrum],
  );
  const harmonics = useMemo(() => harmonicsOf(record), [record]);
  const source = useSource(capture, detail, 'spectrum');
  const fundamental = record.channels[0]?.figures['fundamentalFrequencyHz'];
  return (
    <SpectrumChart
      sub={`${formatPoints(record.settings.fftLength)} points, ${record.settings.window}`}
      state={chartState(spectrum)}
      channels={channels}
      fundamentalHz={typeof fundamental === 'number' ? fundamental : null}
      harmonics={harmonics}
      source={source}
    />
  );
}

function Residual({ capture, detail }: RecordChartsProps) {
  const { record } = detail;
  const residual = useTraces(record, 'residual');
  const wave = useTraces(record, 'wave');
  const yUnit = record.channels.find(({ traces }) => traces['residual'])?.traces['residual']?.yUnit ?? '';
  const { channels, unit } = useMemo(() => {
    if (residual.kind !== 'ready' || wave.kind !== 'ready') return { channels: [], unit: yUnit };
    const scale = residualScale(
      yUnit,
      residual.traces.map(({ trace }) => trace.y),
    );
    const scaled = residual.traces.map(({ channel, trace }) => ({
      name: channelName(channel),
      x: trace.x,
      residual: trace.y.map((value) => value * scale.factor),
      wave:
        wave.traces.find((one) => one.channel === channel)?.trace.y.map((value) => value * scale.factor) ??
        null,
    }));
    return { channels: scaled, unit: scale.unit };
  }, [residual, wave, yUnit]);
  const source = useSource(capture, detail, 'residual');
  return (
    <ResidualChart
      sub="one period, averaged, fundamental removed"
      state={chartState(residual.kind === 'ready' ? wave : residual)}
      channels={channels}
      yUnit={unit}
      source={source}
    />
  );
}

function harmonicsOf(record: ServedRecord) {
  return record.channels.flatMap(({ channel, harmonics }) =>
    harmonics.map(({ order, frequencyHz, levelDbr }) => ({
      channel: channelName(channel),
      order,
      frequencyHz,
      levelDbr,
    })),
  );
}

function useSource(capture: Capture, { id, createdAt, record }: ServedRecordDetail, what: string) {
  return useMemo(
    () => ({
      recordId: id,
      date: createdAt,
      conditions: conditionsLine(capture, record),
      fileStem: `capture-${capture.number}-${what}`,
    }),
    [capture, id, createdAt, record, what],
  );
}

function chartState(traces: TracesState): ChartState {
  switch (traces.kind) {
    case 'ready':
      return { kind: 'ready' };
    case 'failed':
      return {
        kind: 'failed',
        what: 'The trace could not be fetched.',
        why: errorWords(traces.error),
        isRecordSafe: true,
        onRetry: traces.retry,
      };
    case 'loading':
      return {
        kind: 'loading',
        what: 'Fetching the trace',
        share: traces.totalBytes === 0 ? null : traces.loadedBytes / traces.totalBytes,
        amount: `${formatBytes(traces.loadedBytes)} of ${formatBytes(traces.totalBytes)}`,
      };
  }
}
