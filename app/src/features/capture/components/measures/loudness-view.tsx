import { useCallback } from 'react';
import { loudnessModel } from '../../model/between-models';
import type { ReadTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { TraceChart } from './trace-chart';

const NAMES = ['shortTerm'] as const;

/** Loudness as it goes, with the whole file's as a line through it. */
export function LoudnessView({ view }: { view: BodyView }) {
  const { body } = view;
  const build = useCallback((traces: readonly ReadTrace[]) => loudnessModel(body, traces), [body]);
  return (
    <TraceChart
      view={view}
      names={NAMES}
      build={build}
      stem="loudness"
      title="Loudness over time"
      sub="short-term: over 3 s"
      heightPx={372}
      emptyWords="The recording is too short for a short-term loudness."
    />
  );
}
