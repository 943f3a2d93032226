import { balanceModel, SEPARATION_TRACES, separationModel } from '../../model/between-models';
import type { BodyView } from './body-view';
import { TraceChart } from './trace-chart';

/** What of one channel is found in the other, both ways, over the balance of the two. */
export function SeparationView({ view }: { view: BodyView }) {
  return (
    <>
      <TraceChart
        view={view}
        names={SEPARATION_TRACES}
        build={separationModel}
        stem="separation"
        title="Separation"
        sub="the played channel over what of it is in the silent one"
        heightPx={372}
        emptyWords="What leaks cannot be told from the noise."
      />
      <TraceChart
        view={view}
        names={SEPARATION_TRACES}
        build={balanceModel}
        stem="balance"
        title="Balance"
        sub="right less left"
        heightPx={200}
      />
    </>
  );
}
