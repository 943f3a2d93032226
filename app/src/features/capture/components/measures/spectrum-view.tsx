import { useMemo } from 'react';
import { SpectrumChart } from '@/components/charts/spectrum-chart';
import { channelName } from '@/lib/capture-words';
import { formatPoints } from '@/lib/format/quantity';
import type { ServedBody } from '../../api/record-queries';
import { useTraces } from '../../hooks/use-traces';
import type { BodyView } from './body-view';
import { chartStateOf } from './chart-state-of';
import { useChartSource } from './use-chart-source';

interface SpectrumViewProps {
  view: BodyView;
  /** Which of the record's spectra. */
  name?: 'spectrum' | 'spectrumLower';
  title?: string;
  heightPx?: number;
  sub?: string;
}

const NAMES = { spectrum: ['spectrum'], spectrumLower: ['spectrumLower'] } as const;

/** Level over frequency of every channel, harmonics marked where the record lists them. */
export function SpectrumView({ view, name = 'spectrum', title, heightPx, sub }: SpectrumViewProps) {
  const { body } = view;
  const spectrum = useTraces(body, NAMES[name]);
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
  const harmonics = useMemo(() => (name === 'spectrum' ? harmonicsOf(body) : []), [body, name]);
  const source = useChartSource(view, name === 'spectrum' ? 'spectrum' : 'spectrum-lower');
  const fundamental = body.channels[0]?.figures['fundamentalFrequencyHz'];
  return (
    <SpectrumChart
      title={title}
      heightPx={heightPx}
      sub={sub ?? `${formatPoints(body.settings.fftLength)} points, ${body.settings.window}`}
      state={chartStateOf(spectrum)}
      channels={channels}
      fundamentalHz={typeof fundamental === 'number' ? fundamental : null}
      harmonics={harmonics}
      source={source}
    />
  );
}

function harmonicsOf(body: ServedBody) {
  return body.channels.flatMap(({ channel, harmonics }) =>
    harmonics.map(({ order, frequencyHz, levelDbr }) => ({
      channel: channelName(channel),
      order,
      frequencyHz,
      levelDbr,
    })),
  );
}
