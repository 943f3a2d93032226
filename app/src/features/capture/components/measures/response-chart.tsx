import { useCallback } from 'react';
import type { ReadTrace } from '../../model/read-trace';
import { fittingSpan, responseModel } from '../../model/response-model';
import type { ResponseSpan } from '../../model/response-model';
import type { BodyView } from './body-view';
import { TraceChart } from './trace-chart';

const NAMES = ['response'] as const;

interface ResponseChartProps {
  view: BodyView;
  /** The narrowest that fits when null. */
  span: ResponseSpan | null;
  quantity?: string;
  title: string;
  sub?: string;
  heightPx?: number;
}

/** Level over frequency against 1 kHz, within a span. */
export function ResponseChart({ view, span, quantity, title, sub, heightPx = 392 }: ResponseChartProps) {
  const { body } = view;
  const build = useCallback(
    (traces: readonly ReadTrace[]) =>
      responseModel({ body, traces, name: 'response' }, span ?? fittingSpan(traces), quantity),
    [body, span, quantity],
  );
  return (
    <TraceChart
      view={view}
      names={NAMES}
      build={build}
      stem="response"
      title={title}
      sub={sub}
      heightPx={heightPx}
    />
  );
}
