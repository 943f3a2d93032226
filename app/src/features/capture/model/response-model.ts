import { extentOf, stepRange } from '@/components/charts/axis-range';
import { slotOf } from '@/components/charts/chart-model';
import type { AxisModel, ChartModel, TraceModel } from '@/components/charts/chart-model';
import { channelName } from '@/lib/capture-words';
import type { ServedBody } from '../api/record-queries';
import { channelIndex, tracesNamed } from './read-trace';
import type { ReadTrace } from './read-trace';

/** How much of a response is drawn either side of zero; `full` shows all of it. */
export const RESPONSE_SPANS = ['0.1', '0.3', '1', '3', 'full'] as const;
export type ResponseSpan = (typeof RESPONSE_SPANS)[number];

const AUDIBLE_HZ = [20, 20_000] as const;
const USUAL_HZ = { min: 20, max: 20_000 };

/** A log axis over all that these curves hold. */
export function frequencyAxis(lists: readonly ArrayLike<number>[]): AxisModel {
  const { min, max } = extentOf(lists) ?? USUAL_HZ;
  return {
    quantity: 'Frequency',
    unit: 'Hz',
    scale: 'log',
    min: Math.max(1, min),
    max: Math.max(2, max),
  };
}

export interface CurvesOver {
  readonly body: ServedBody;
  readonly traces: readonly ReadTrace[];
  readonly name: string;
}

/** A named trace of every channel, each in its channel's slot. */
export function channelCurves({ body, traces, name }: CurvesOver): TraceModel[] {
  return tracesNamed(traces, name)
    .filter(({ trace }) => trace.x.length > 0)
    .map(({ channel, trace }) => ({
      id: `${channel}-${name}`,
      name: channelName(channel),
      kind: 'curve',
      slot: slotOf(channelIndex(body, channel)),
      x: trace.x,
      y: trace.y,
    }));
}

/** The narrowest span that holds a response from 20 Hz to 20 kHz; all of it where none does. */
export function fittingSpan(traces: readonly Pick<ReadTrace, 'trace'>[]): ResponseSpan {
  const greatest = traces.reduce((most, { trace }) => {
    let top = most;
    trace.x.forEach((hz, index) => {
      if (hz >= AUDIBLE_HZ[0] && hz <= AUDIBLE_HZ[1]) top = Math.max(top, Math.abs(trace.y[index] ?? 0));
    });
    return top;
  }, 0);
  return RESPONSE_SPANS.find((span) => span !== 'full' && Number(span) >= greatest) ?? 'full';
}

/** All of a response, out to steps that suit how far it falls. */
function wholeRange(traces: readonly TraceModel[]) {
  const levels = traces.map(({ y }) => y);
  const { min, max } = extentOf(levels) ?? { min: -1, max: 1 };
  return stepRange(levels, max - min > 40 ? 10 : max - min > 10 ? 5 : 1);
}

/** Level against 1 kHz over frequency. */
export function responseModel(
  parts: CurvesOver,
  span: ResponseSpan,
  quantity = 'Level against 1 kHz',
): ChartModel {
  const traces = channelCurves(parts);
  const range = span === 'full' ? wholeRange(traces) : { min: -Number(span), max: Number(span) };
  return {
    x: frequencyAxis(traces.map(({ x }) => x)),
    y: { quantity, unit: 'dB', scale: 'linear', ...range, isSigned: true },
    traces,
    hasZeroLine: true,
  };
}
