import type { BenchRecord, ChannelResult, Figures, RecordBody } from '@benchlark/dsp';
import { queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { RecordDetail } from '@/lib/api-schema';
import { fetchTrace } from '@/lib/fetch-trace';
import type { TraceProgress, TraceRef } from '@/lib/fetch-trace';

interface WithTraceRefs {
  readonly channels: readonly (Omit<ChannelResult, 'traces'> & {
    readonly traces: Readonly<Record<string, TraceRef>>;
  })[];
  readonly between: { readonly figures: Figures; readonly traces: Readonly<Record<string, TraceRef>> };
  readonly segments: readonly ServedBody[];
}

/** What a record and each part of a programme have alike, with a reference in the place of each trace. */
export type ServedBody = Omit<RecordBody, keyof WithTraceRefs> & WithTraceRefs;

/** A record as the API gives it. */
export type ServedRecord = Omit<BenchRecord, keyof WithTraceRefs> & WithTraceRefs;

export type ServedRecordDetail = Omit<RecordDetail, 'record'> & { readonly record: ServedRecord };

export const recordQueries = {
  all: () => ['records'] as const,
  detail: (recordId: string) =>
    queryOptions({
      queryKey: [...recordQueries.all(), 'detail', recordId] as const,
      queryFn: async ({ signal }) => {
        const detail = await unwrap(
          api.GET('/api/records/{id}', { params: { path: { id: recordId } }, signal }),
        );
        // The OpenAPI document leaves the record open; its shape is the contract's, which dsp types.
        return detail as unknown as ServedRecordDetail;
      },
    }),
  trace: (ref: TraceRef, onProgress: (progress: TraceProgress) => void) =>
    queryOptions({
      queryKey: [...recordQueries.all(), 'trace', ref.href] as const,
      queryFn: ({ signal }) => fetchTrace(ref, { signal, onProgress }),
      staleTime: Infinity, // known by the hash of its bytes
      gcTime: 60_000, // a spectrum holds two megabytes
    }),
};
