import type { BenchRecord } from '@benchlark/dsp';
import { useQueryClient } from '@tanstack/react-query';
import { useLayoutEffect, useMemo } from 'react';
import { recordQueries } from '../api/record-queries';
import { serveRecord } from '../model/serve-record';
import { MeasuredBody } from './measured-body';
import type { BodySubject } from './measures/body-view';
import { PartHead } from './parts/part-head';
import './capture.css';

interface LocalRecordProps {
  /** Of the take; no two share it. */
  id: string;
  record: BenchRecord;
  subject: BodySubject;
  madeAt: string;
  part: number | null;
}

const nothing = () => undefined;

/** A record that isn't in the archive yet, with the charts and tables that it will have there. */
export function LocalRecord({ id, record, subject, madeAt, part }: LocalRecordProps) {
  const queryClient = useQueryClient();
  const made = useMemo(() => serveRecord(record, `take:${id}`), [record, id]);
  // Again for each part: the cache gives up what nobody draws for a minute.
  useLayoutEffect(() => {
    for (const [href, trace] of made.traces) {
      const ref = { href, points: trace.x.length, xUnit: trace.xUnit, yUnit: trace.yUnit };
      queryClient.setQueryData(recordQueries.trace(ref, nothing).queryKey, trace);
    }
  }, [made, part, queryClient]);
  const served = made.record;
  const body = part === null ? served : served.segments[part - 1];
  if (!body) return null;
  return (
    <>
      {part !== null && <PartHead parts={served.segments} number={part} />}
      <MeasuredBody
        key={part}
        view={{ capture: subject, detail: { id: null, createdAt: madeAt }, body, segment: part }}
      />
    </>
  );
}
