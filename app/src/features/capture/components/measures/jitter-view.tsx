import { useCallback, useState } from 'react';
import { SlotSelect } from '@/components/sentence/slot';
import { jitterModel } from '../../model/jitter-model';
import type { Reach } from '../../model/jitter-model';
import type { ReadTrace } from '../../model/read-trace';
import type { BodyView } from './body-view';
import { TraceChart } from './trace-chart';
import { ViewSentence } from './view-sentence';

const NAMES = ['closeIn'] as const;
const REACHES = [
  { value: '5000', label: '5\u00a0kHz' },
  { value: '1000', label: '1\u00a0kHz' },
  { value: '250', label: '250\u00a0Hz' },
] as const;

/** What stands close beside a high tone: sideband pairs of an unsteady clock. */
export function JitterView({ view }: { view: BodyView }) {
  const { body } = view;
  const [reach, setReach] = useState<Reach>('5000');
  const build = useCallback(
    (traces: readonly ReadTrace[]) => jitterModel(body, traces, reach),
    [body, reach],
  );
  return (
    <>
      <ViewSentence>
        Show <SlotSelect label="Reach" value={reach} options={REACHES} onChange={setReach} /> either side of
        the tone.
      </ViewSentence>
      <TraceChart
        view={view}
        names={NAMES}
        build={build}
        stem="close-in"
        title="Beside the tone"
        sub="pairs that stand 10 dB over the noise are marked"
        heightPx={392}
      />
    </>
  );
}
