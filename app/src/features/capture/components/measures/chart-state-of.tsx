import type { ChartState } from '@/components/charts/chart-state';
import { errorWords } from '@/lib/error-words';
import { formatBytes } from '@/lib/format/quantity';
import type { TracesState } from '../../hooks/use-traces';

/** How a chart stands while its traces come, fail, or turn out to hold nothing. */
export function chartStateOf(traces: TracesState, emptyWords?: string): ChartState {
  switch (traces.kind) {
    case 'ready': {
      const isEmpty = traces.traces.every(({ trace }) => trace.x.length === 0);
      return isEmpty && emptyWords ? { kind: 'empty', children: <p>{emptyWords}</p> } : { kind: 'ready' };
    }
    case 'failed':
      return {
        kind: 'failed',
        what: 'The trace could not be fetched.',
        why: errorWords(traces.error),
        isRecordSafe: true,
        onRetry: traces.retry,
      };
    case 'loading':
      return {
        kind: 'loading',
        what: 'Fetching the trace',
        share: traces.totalBytes === 0 ? null : traces.loadedBytes / traces.totalBytes,
        amount: `${formatBytes(traces.loadedBytes)} of ${formatBytes(traces.totalBytes)}`,
      };
  }
}
