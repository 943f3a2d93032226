import { useMemo } from 'react';
import type { ChartSource } from '@/components/charts/chart-source';
import { CurveChart } from '@/components/charts/curve-chart';
import { Section } from '@/components/page/page';
import { WaveformDrawing } from '@/components/waveform/waveform-drawing';
import { formatDuration, formatSampleRate } from '@/lib/format/quantity';
import { beginningModel, spectrumModel } from '../model/preview-charts';
import type { StimulusPreview } from '../worker/preview';

const CHANNELS = ['left', 'right'] as const;

/** The file before it is made: all of it, its first wave, its spectrum. */
export function StimulusPreviewCharts({ preview, title }: { preview: StimulusPreview; title: string }) {
  const { descriptor, durationS, overview } = preview;
  const [part] = descriptor.parts;
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
  const marked = part === undefined || descriptor.parts.length > 1 ? null : part;
  const about = descriptor.parts.length > 1 ? 'of its first part' : 'of its body';
  const isSilent = preview.spectrum.x.length === 0;
  return (
    <>
      <Section title="The whole file" sub={formatDuration(durationS)}>
        <WaveformDrawing overview={overview} durationS={durationS} channels={CHANNELS} segment={marked} />
      </Section>
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
