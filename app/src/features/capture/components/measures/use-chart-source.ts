import { useMemo } from 'react';
import type { ChartSource } from '@/components/charts/chart-source';
import { conditionsLine } from '../../model/record-words';
import type { BodyView } from './body-view';

/** What an exported chart says it is from, and what its file is called. */
export function useChartSource({ capture, detail, body, segment }: BodyView, what: string): ChartSource {
  const { id, createdAt } = detail;
  return useMemo(
    () => ({
      recordId: id,
      date: createdAt,
      conditions: conditionsLine(capture, body),
      fileStem: [
        capture.number === null ? 'take' : `capture-${capture.number}`,
        segment === null ? null : `part-${segment}`,
        what,
      ]
        .filter((part) => part !== null)
        .join('-'),
    }),
    [capture, id, createdAt, body, segment, what],
  );
}
