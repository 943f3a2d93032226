import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { api, unwrap } from '@/lib/api-client';
import { fetchTrace, type FetchedTrace, type TraceRef } from '@/lib/fetch-trace';

interface ServedPart {
  readonly measure: string;
  readonly settings: { readonly fftLength: number };
  readonly capture?: { readonly sampleRateHz: number };
  readonly channels: readonly { readonly traces: Readonly<Record<string, TraceRef>> }[];
  readonly segments: readonly ServedPart[];
}

interface Floor {
  readonly trace: FetchedTrace;
  readonly binHz: number;
}

/** Silence tells most of a rig alone; a tone's spectrum holds its lines too. */
const TOLD_BY = ['idle', 'dynamic-range', 'tone'] as const;

async function fetchFloor(recordId: string, signal: AbortSignal): Promise<Floor | null> {
  const detail = await unwrap(api.GET('/api/records/{id}', { params: { path: { id: recordId } }, signal }));
  // The OpenAPI document leaves the record open; its shape is the contract's.
  const record = detail.record as unknown as ServedPart;
  const parts = record.segments.length > 0 ? record.segments : [record];
  const part = TOLD_BY.map((measure) => parts.find((one) => one.measure === measure)).find(Boolean);
  const ref = part?.channels[0]?.traces['spectrum'];
  if (!part || !ref || !record.capture) return null;
  const trace = await fetchTrace(ref, { signal });
  return { trace, binHz: record.capture.sampleRateHz / part.settings.fftLength };
}

/**
 * The rig without a unit, as its baseline shows it, brought to the bins of the live spectrum: noise falls by the ratio of
 * the bins' widths. Null until it is there, and where the baseline has no spectrum.
 */
export function useRigFloor(
  recordId: string | null,
  liveBinHz: number | null,
): { x: Float64Array; y: Float64Array } | null {
  const { data } = useQuery({
    queryKey: ['live', 'rig-floor', recordId] as const,
    queryFn: ({ signal }) => fetchFloor(recordId ?? '', signal),
    enabled: recordId !== null,
    staleTime: Infinity, // a record never changes
  });
  return useMemo(() => {
    if (!data || liveBinHz === null) return null;
    const offsetDb = 10 * Math.log10(liveBinHz / data.binHz);
    return { x: data.trace.x, y: data.trace.y.map((level) => level + offsetDb) };
  }, [data, liveBinHz]);
}
