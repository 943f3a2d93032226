import { useState } from 'react';
import type { ResponseSpan } from '../../model/response-model';
import type { BodyView } from './body-view';
import { ResponseChart } from './response-chart';
import { SpanSlot } from './span-slot';
import { ViewSentence } from './view-sentence';

/** White noise through a converter's filter: its pass band and its fall. */
export function FilterView({ view }: { view: BodyView }) {
  const [span, setSpan] = useState<ResponseSpan>('full');
  return (
    <>
      <ViewSentence>
        Show the filter within <SpanSlot value={span} onChange={setSpan} />.
      </ViewSentence>
      <ResponseChart
        view={view}
        span={span}
        quantity="Level"
        title="What the filter lets through"
        sub="white noise, averaged"
      />
    </>
  );
}
