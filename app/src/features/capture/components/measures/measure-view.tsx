import type { MeasureId } from '@benchlark/dsp';
import type { ComponentType } from 'react';
import { PAIR_STEP_TRACES } from '../../model/pair-steps-model';
import { hasTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { FilterView } from './filter-view';
import { IntersampleView } from './intersample-view';
import { JitterView } from './jitter-view';
import { LevelStepsView } from './level-steps-view';
import { LoudnessView } from './loudness-view';
import { MultitoneView } from './multitone-view';
import { ResidualView } from './residual-view';
import { SeparationView } from './separation-view';
import { SpectrumView } from './spectrum-view';
import { SweepView } from './sweep-view';
import { TwoToneStepsView } from './two-tone-steps-view';
import { TwoToneView } from './two-tone-view';

type View = ComponentType<{ view: BodyView }>;

/** The charts of a measure, chosen by the question they answer, and the traces without which there is nothing to draw. */
const VIEWS: Partial<Record<MeasureId, { traces: readonly string[]; View: View }>> = {
  'level-steps': { traces: ['deviation'], View: LevelStepsView },
  'two-tone': { traces: ['spectrum'], View: TwoToneView },
  'two-tone-steps': { traces: PAIR_STEP_TRACES, View: TwoToneStepsView },
  sweep: { traces: ['response'], View: SweepView },
  multitone: { traces: ['response'], View: MultitoneView },
  separation: { traces: ['balance'], View: SeparationView },
  jitter: { traces: ['closeIn'], View: JitterView },
  intersample: { traces: ['spectrum'], View: IntersampleView },
  filter: { traces: ['response'], View: FilterView },
  loudness: { traces: ['shortTerm'], View: LoudnessView },
};

/** Charts of a body, whatever was measured; one without traces of its own has none. */
export function MeasureView({ view }: { view: BodyView }) {
  const known = VIEWS[view.body.measure];
  if (known && known.traces.some((name) => hasTrace(view.body, name))) return <known.View view={view} />;
  return (
    <>
      {hasTrace(view.body, 'spectrum') && <SpectrumView view={view} />}
      {hasTrace(view.body, 'residual') && <ResidualView view={view} />}
    </>
  );
}
