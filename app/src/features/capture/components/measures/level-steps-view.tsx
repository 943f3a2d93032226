import { useCallback, useState } from 'react';
import { SlotSelect } from '@/components/sentence/slot';
import type { LevelAgainst } from '../../model/level-axis';
import { addedModel, deviationModel, transferModel } from '../../model/level-steps-model';
import type { AddedAs } from '../../model/level-steps-model';
import type { ReadTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { LevelSlot } from './level-slot';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

const NAMES = ['deviation', 'measuredLevel', 'thd', 'thdPlusNoise', 'residual', 'noise'] as const;

type Question = 'follows' | 'transfer';
const QUESTIONS = [
  { value: 'follows', label: 'whether the output follows' },
  { value: 'transfer', label: 'output against input' },
] as const;
const ADDED_AS = [
  { value: 'ratio', label: 'against the tone' },
  { value: 'level', label: 'as a level of its own' },
] as const;

/** One tone at many levels: deviation over what is added on one level axis, or output against input. */
export function LevelStepsView({ view }: { view: BodyView }) {
  const [question, setQuestion] = useState<Question>('follows');
  const [against, setAgainst] = useState<LevelAgainst>('stimulus');
  const [as, setAs] = useState<AddedAs>('ratio');
  return (
    <>
      <ViewSentence>
        Show <SlotSelect label="Show" value={question} options={QUESTIONS} onChange={setQuestion} />
        {question === 'follows' && (
          <>
            , levels against <LevelSlot body={view.body} value={against} onChange={setAgainst} />, what is
            added <SlotSelect label="Added" value={as} options={ADDED_AS} onChange={setAs} />
          </>
        )}
        .
      </ViewSentence>
      {question === 'follows' ? (
        <FollowsCharts view={view} against={against} as={as} />
      ) : (
        <TransferChart view={view} />
      )}
    </>
  );
}

function FollowsCharts({ view, against, as }: { view: BodyView; against: LevelAgainst; as: AddedAs }) {
  const { body } = view;
  const buildDeviation = useCallback(
    (traces: readonly ReadTrace[]) => deviationModel({ body, traces, against }),
    [body, against],
  );
  const buildAdded = useCallback(
    (traces: readonly ReadTrace[]) => addedModel({ body, traces, against }, as),
    [body, against, as],
  );
  return (
    <>
      <TraceChart
        view={view}
        names={NAMES}
        build={buildDeviation}
        stem="deviation"
        title="Deviation from linear"
        sub="against the step at −20 dBFS"
        heightPx={214}
        emptyWords="No step holds the tone."
      />
      <TraceChart
        view={view}
        names={NAMES}
        build={buildAdded}
        stem="distortion-against-level"
        title="Distortion and noise"
        sub="THD where it is clear of the noise"
        heightPx={392}
        emptyWords="No step holds the tone."
      />
    </>
  );
}

function TransferChart({ view }: { view: BodyView }) {
  const { body } = view;
  const build = useCallback((traces: readonly ReadTrace[]) => transferModel({ body, traces }), [body]);
  return (
    <TraceChart
      view={view}
      names={NAMES}
      build={build}
      stem="output-against-input"
      title="Output against input"
      sub="a decibel is as long on both axes"
      heightPx={520}
      emptyWords="No step holds the tone."
    />
  );
}
