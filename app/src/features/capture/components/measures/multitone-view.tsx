import { useCallback, useState } from 'react';
import { noiseAndDistortionModel } from '../../model/between-models';
import { hasTrace } from '../../model/read-trace';
import type { ReadTrace } from '../../model/read-trace';
import { channelCurves } from '../../model/response-model';
import type { ResponseSpan } from '../../model/response-model';
import type { BodyView } from './body-view';
import { ResponseChart } from './response-chart';
import { SpanSlot } from './span-slot';
import { SpectrumView } from './spectrum-view';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

const NAMES = ['noiseAndDistortion'] as const;

/** Many tones at once: what becomes of each, over what stands between them. */
export function MultitoneView({ view }: { view: BodyView }) {
  const { body } = view;
  const [span, setSpan] = useState<ResponseSpan>('1');
  const unit = body.channels.find(({ traces }) => traces['noiseAndDistortion'])?.traces['noiseAndDistortion'];
  const yUnit = unit?.yUnit ?? 'dB';
  const build = useCallback(
    (traces: readonly ReadTrace[]) =>
      noiseAndDistortionModel(channelCurves({ body, traces, name: 'noiseAndDistortion' }), yUnit),
    [body, yUnit],
  );
  if (!hasTrace(body, 'response') && hasTrace(body, 'spectrum')) return <SpectrumView view={view} />;
  return (
    <>
      <ViewSentence>
        Show the tones within <SpanSlot value={span} onChange={setSpan} />.
      </ViewSentence>
      <ResponseChart
        view={view}
        span={span}
        title="What comes out"
        sub="each tone against 1 kHz"
        heightPx={260}
      />
      <TraceChart
        view={view}
        names={NAMES}
        build={build}
        stem="noise-and-distortion"
        title="What stands between the tones"
        heightPx={320}
      />
    </>
  );
}
