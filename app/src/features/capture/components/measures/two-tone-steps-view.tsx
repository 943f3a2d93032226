import { useCallback, useState } from 'react';
import { PAIR_STEP_TRACES, pairStepsModel } from '../../model/pair-steps-model';
import type { LevelAgainst } from '../../model/level-axis';
import type { ReadTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { LevelSlot } from './level-slot';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

/** Products of two tones against the level they were played at. */
export function TwoToneStepsView({ view }: { view: BodyView }) {
  const { body } = view;
  const [against, setAgainst] = useState<LevelAgainst>('stimulus');
  const build = useCallback(
    (traces: readonly ReadTrace[]) => pairStepsModel(body, traces, against),
    [body, against],
  );
  return (
    <>
      <ViewSentence>
        Show the products, levels (the peak as that of a sine) against{' '}
        <LevelSlot body={body} value={against} onChange={setAgainst} />.
      </ViewSentence>
      <TraceChart
        view={view}
        names={PAIR_STEP_TRACES}
        build={build}
        stem="products-against-level"
        title="Products against level"
        sub="where they are clear of the noise"
        heightPx={400}
        emptyWords="No product stands clear of the noise at any level."
      />
    </>
  );
}
