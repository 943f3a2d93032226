import { useQueries } from '@tanstack/react-query';
import type { UseQueryResult } from '@tanstack/react-query';
import { useCallback, useMemo, useState } from 'react';
import type { FetchedTrace, TraceProgress } from '@/lib/fetch-trace';
import { recordQueries } from '../api/record-queries';
import type { ServedBody } from '../api/record-queries';
import type { ReadTrace } from '../model/read-trace';

export type TracesState =
  | { kind: 'loading'; loadedBytes: number; totalBytes: number }
  | { kind: 'failed'; error: Error; retry: () => void }
  | { kind: 'ready'; traces: readonly ReadTrace[] };

/**
 * Traces of these names, of every channel that has them and of what lies between channels, with how much of all
 * their bytes has come. Keep the identity of `names`.
 */
export function useTraces(body: ServedBody, names: readonly string[]): TracesState {
  const [progress, setProgress] = useState<Readonly<Record<string, TraceProgress>>>({});
  const report = useCallback(
    (href: string, step: TraceProgress) => setProgress((known) => ({ ...known, [href]: step })),
    [],
  );
  const refs = useMemo(() => refsOf(body, names), [body, names]);
  // What `combine` gives keeps its identity as long as the traces do: charts are built from it.
  const combine = useCallback(
    (results: UseQueryResult<FetchedTrace>[]): TracesState | { kind: 'loading' } => {
      const failed = results.find(({ isError }) => isError);
      if (failed?.error) {
        const retry = () => results.forEach((one) => one.isError && void one.refetch());
        return { kind: 'failed', error: failed.error, retry };
      }
      const traces = refs.flatMap(({ channel, name }, index) => {
        const trace = results[index]?.data;
        return trace ? [{ channel, name, trace }] : [];
      });
      return traces.length === refs.length ? { kind: 'ready', traces } : { kind: 'loading' };
    },
    [refs],
  );
  const state = useQueries({
    queries: refs.map(({ ref }) => recordQueries.trace(ref, (step) => report(ref.href, step))),
    combine,
  });
  if (state.kind !== 'loading') return state;
  return {
    kind: 'loading',
    loadedBytes: refs.reduce((sum, { ref }) => sum + (progress[ref.href]?.loadedBytes ?? 0), 0),
    totalBytes: refs.reduce((sum, { ref }) => sum + ref.points * BYTES_PER_POINT, 0),
  };
}

function refsOf({ channels, between }: ServedBody, names: readonly string[]) {
  const places = [...channels, { channel: 'between', traces: between.traces }];
  return names.flatMap((name) =>
    places.flatMap(({ channel, traces }) => {
      const ref = traces[name];
      return ref ? [{ channel, name, ref }] : [];
    }),
  );
}

/** x and y as Float64. */
const BYTES_PER_POINT = 16;
