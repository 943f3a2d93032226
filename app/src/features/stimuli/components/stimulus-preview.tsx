import { useMemo } from 'react';
import type { ChartSource } from '@/components/charts/chart-source';
import { CurveChart } from '@/components/charts/curve-chart';
import { Section } from '@/components/page/page';
import { WaveformDrawing } from '@/components/waveform/waveform-drawing';
import { formatDuration, formatSampleRate } from '@/lib/format/quantity';
import { beginningModel, spectrumModel } from '../model/preview-charts';
import type { StimulusPreview } from '../worker/preview';

const CHANNELS = ['left', 'right'] as const;

/** All of a file at a glance. */
export function StimulusWhole({
  preview: { descriptor, durationS, overview },
}: {
  preview: StimulusPreview;
}) {
  const [part] = descriptor.parts;
  const marked = part === undefined || descriptor.parts.length > 1 ? null : part;
  return (
    <Section
      title="The whole file"
      sub={`${formatDuration(durationS)}, sketched from samples here and there`}
    >
      <WaveformDrawing overview={overview} durationS={durationS} channels={CHANNELS} segment={marked} />
    </Section>
  );
}

/** What the file holds before it is made: its spectrum and its first wave. */
export function StimulusPreviewCharts({ preview, title }: { preview: StimulusPreview; title: string }) {
  const { descriptor } = preview;
  const wave = useMemo(() => beginningModel(preview), [preview]);
  const spectrum = useMemo(() => spectrumModel(preview), [preview]);
  const source: ChartSource = useMemo(
    () => ({
      recordId: null,
      date: new Date().toISOString(),
      conditions: `${title}, ${formatSampleRate(descriptor.sampleRateHz)}`,
      fileStem: `stimulus-${descriptor.name}`,
    }),
    [title, descriptor],
  );
  const about = descriptor.parts.length > 1 ? 'of its first part' : 'of its body';
  const isSilent = preview.spectrum.x.length === 0;
  return (
    <>
      <CurveChart
        title="What it holds"
        sub={`the spectrum ${about}, before dither`}
        model={spectrum}
        source={source}
        state={isSilent ? { kind: 'empty', children: 'Digital zero has no spectrum.' } : { kind: 'ready' }}
        heightPx={320}
      />
      {!isSilent && (
        <CurveChart
          title="How it begins"
          sub={`the wave ${about}`}
          model={wave}
          source={source}
          heightPx={220}
        />
      )}
    </>
  );
}
