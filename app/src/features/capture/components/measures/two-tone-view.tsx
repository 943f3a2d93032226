import { useCallback, useState } from 'react';
import { SlotSelect } from '@/components/sentence/slot';
import type { ReadTrace } from '../../model/read-trace';
import { twoToneModel, usualTwoToneAxis } from '../../model/two-tone-model';
import type { TwoToneAxis } from '../../model/two-tone-model';
import type { BodyView } from './body-view';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

const NAMES = ['spectrum'] as const;
const AXES = [
  { value: 'around', label: 'close in around the high tone' },
  { value: 'even', label: 'over an even frequency axis' },
  { value: 'octaves', label: 'over octaves' },
] as const;

/** Two tones at once and what they make of each other, each product marked. */
export function TwoToneView({ view }: { view: BodyView }) {
  const { body } = view;
  const [axis, setAxis] = useState<TwoToneAxis>(() => usualTwoToneAxis(body));
  const build = useCallback((traces: readonly ReadTrace[]) => twoToneModel(body, traces, axis), [body, axis]);
  return (
    <>
      <ViewSentence>
        Show the two tones <SlotSelect label="Axis" value={axis} options={AXES} onChange={setAxis} />.
      </ViewSentence>
      <TraceChart
        view={view}
        names={NAMES}
        build={build}
        stem="two-tones"
        title="What the tones make of each other"
        sub="f1 the low tone, f2 the high one"
        heightPx={400}
      />
    </>
  );
}
