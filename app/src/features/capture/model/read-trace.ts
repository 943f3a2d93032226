import type { FetchedTrace } from '@/lib/fetch-trace';
import type { ServedBody } from '../api/record-queries';

/** A trace with the place it came from; `between` where it lies between channels or is of the whole file. */
export interface ReadTrace {
  readonly channel: string;
  readonly name: string;
  readonly trace: FetchedTrace;
}

export function tracesNamed(traces: readonly ReadTrace[], name: string): readonly ReadTrace[] {
  return traces.filter((one) => one.name === name);
}

export function hasTrace({ channels, between }: ServedBody, name: string): boolean {
  return [...channels, between].some(({ traces }) => name in traces);
}

/** A channel keeps its place among the record's channels, whichever of them have the trace. */
export function channelIndex({ channels }: Pick<ServedBody, 'channels'>, channel: string): number {
  return Math.max(
    0,
    channels.findIndex((one) => one.channel === channel),
  );
}
