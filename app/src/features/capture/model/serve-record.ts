import type { BenchRecord, RecordBody, Trace } from '@benchlark/dsp';
import type { FetchedTrace, TraceRef } from '@/lib/fetch-trace';
import type { ServedBody, ServedRecord } from '../api/record-queries';

export interface ServedLocally {
  readonly record: ServedRecord;
  /** By the address that stands in the record. */
  readonly traces: ReadonlyMap<string, FetchedTrace>;
}

/**
 * Puts a record that was made on this page into the form in which the server gives one: references in the places of
 * traces, and the traces beside it.
 *
 * @param prefix - of the references; no two records share it
 */
export function serveRecord(record: BenchRecord, prefix: string): ServedLocally {
  const traces = new Map<string, FetchedTrace>();
  const refer = (own: Readonly<Record<string, Trace>>, place: string): Record<string, TraceRef> =>
    Object.fromEntries(
      Object.entries(own).map(([name, { x, y, xUnit, yUnit }]) => {
        const href = `${prefix}/${place}/${name}`;
        traces.set(href, { x: Float64Array.from(x), y: Float64Array.from(y), xUnit, yUnit });
        return [name, { href, points: x.length, xUnit, yUnit }];
      }),
    );
  const serveBody = (body: RecordBody, place: string): ServedBody => ({
    ...body,
    channels: body.channels.map((channel) => ({
      ...channel,
      traces: refer(channel.traces, `${place}${channel.channel}`),
    })),
    between: { ...body.between, traces: refer(body.between.traces, `${place}between`) },
    segments: body.segments.map((segment, index) => serveBody(segment, `${place}part-${index + 1}/`)),
  });
  const { schema, dspVersion, capture } = record;
  return { record: { schema, dspVersion, capture, ...serveBody(record, '') }, traces };
}
