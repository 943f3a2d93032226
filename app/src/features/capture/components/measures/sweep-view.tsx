import { useCallback, useState } from 'react';
import { SlotSelect } from '@/components/sentence/slot';
import type { ChartModel } from '@/components/charts/chart-model';
import { channelName } from '@/lib/capture-words';
import { useTraces } from '../../hooks/use-traces';
import { hasTrace } from '../../model/read-trace';
import type { ReadTrace } from '../../model/read-trace';
import { fittingSpan } from '../../model/response-model';
import type { ResponseSpan } from '../../model/response-model';
import { HARMONIC_TRACES, harmonicsModel, impulseModel, phaseModel } from '../../model/sweep-model';
import type { BodyView } from './body-view';
import { ResponseChart } from './response-chart';
import { SpanSlot } from './span-slot';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

type Question = 'response' | 'phase' | 'impulse' | 'harmonics';
const QUESTIONS: readonly { value: Question; label: string; trace: string }[] = [
  { value: 'response', label: 'What comes out?', trace: 'response' },
  { value: 'phase', label: 'How is its phase turned?', trace: 'phase' },
  { value: 'impulse', label: 'What becomes of an impulse?', trace: 'impulse' },
  { value: 'harmonics', label: 'What is added?', trace: 'harmonic2' },
];
const RESPONSE = ['response'] as const;

/** A tone that rises through all frequencies: one question at a time. */
export function SweepView({ view }: { view: BodyView }) {
  const { body } = view;
  const [question, setQuestion] = useState<Question>('response');
  const [chosenSpan, setSpan] = useState<ResponseSpan | null>(null);
  const [channel, setChannel] = useState(body.channels[0]?.channel ?? 'left');
  const response = useTraces(body, RESPONSE);
  const span = chosenSpan ?? fittingSpan(response.kind === 'ready' ? response.traces : []);
  const channels = body.channels.filter(({ traces }) => HARMONIC_TRACES.some((name) => name in traces));
  return (
    <>
      <ViewSentence>
        <SlotSelect
          label="Question"
          value={question}
          options={QUESTIONS.filter(({ trace }) => hasTrace(body, trace))}
          onChange={setQuestion}
        />
        {question === 'response' && (
          <>
            {' '}
            Drawn within <SpanSlot value={span} onChange={setSpan} />.
          </>
        )}
        {question === 'harmonics' && channels.length > 1 && (
          <>
            {' '}
            Of the{' '}
            <SlotSelect
              label="Channel"
              value={channel}
              options={channels.map((one) => ({ value: one.channel, label: channelName(one.channel) }))}
              onChange={setChannel}
            />{' '}
            channel.
          </>
        )}
      </ViewSentence>
      {question === 'response' && (
        <ResponseChart view={view} span={span} title="What comes out" sub="level over frequency" />
      )}
      {question === 'phase' && <PhaseOrImpulse view={view} kind="phase" />}
      {question === 'impulse' && <PhaseOrImpulse view={view} kind="impulse" />}
      {question === 'harmonics' && <HarmonicsChart view={view} channel={channel} />}
    </>
  );
}

const CURVES = {
  phase: {
    names: ['phase'],
    model: phaseModel,
    title: 'How its phase is turned',
    sub: 'the delay taken out',
  },
  impulse: {
    names: ['impulse'],
    model: impulseModel,
    title: 'What becomes of an impulse',
    sub: 'about its arrival',
  },
} as const;

function PhaseOrImpulse({ view, kind }: { view: BodyView; kind: keyof typeof CURVES }) {
  const { body } = view;
  const { names, model, title, sub } = CURVES[kind];
  const build = useCallback((traces: readonly ReadTrace[]): ChartModel => model(body, traces), [body, model]);
  return (
    <TraceChart view={view} names={names} build={build} stem={kind} title={title} sub={sub} heightPx={392} />
  );
}

function HarmonicsChart({ view, channel }: { view: BodyView; channel: string }) {
  const build = useCallback((traces: readonly ReadTrace[]) => harmonicsModel(traces, channel), [channel]);
  return (
    <TraceChart
      view={view}
      names={HARMONIC_TRACES}
      build={build}
      stem="harmonics-over-frequency"
      title="What is added"
      sub={`${channelName(channel)}, power mean over twelfths of an octave`}
      heightPx={392}
      emptyWords="No harmonic of this channel lies within the recording’s band."
    />
  );
}
