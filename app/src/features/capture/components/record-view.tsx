import { useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { Capture } from '@/lib/api-schema';
import type { ServedBody, ServedRecordDetail } from '../api/record-queries';
import { partSearch } from '../model/part-address';
import { FailedState } from '@/components/states/states';
import { Link } from 'react-router-dom';
import { MeasuredBody } from './measured-body';
import { PartHead } from './parts/part-head';
import { Waveform } from './waveform';

interface RecordViewProps {
  capture: Capture;
  detail: ServedRecordDetail;
  /** The part of a programme that is open: 1, 2, 3 ...; the whole when null. */
  part: number | null;
}

/** Everything that was measured: charts first, then figures, then the recording they are from. */
export function RecordView({ capture, detail, part }: RecordViewProps) {
  const { record } = detail;
  if (part !== null && record.segments.length > 0) {
    const body = record.segments[part - 1];
    if (!body) return <NoSuchPart count={record.segments.length} />;
    return (
      <>
        <PartHead parts={record.segments} number={part} />
        <MeasuredBody key={part} view={{ capture, detail, body, segment: part }} />
        <BodyWaveform capture={capture} body={body} />
      </>
    );
  }
  return (
    <>
      <MeasuredBody view={{ capture, detail, body: record, segment: null }} />
      <BodyWaveform capture={capture} body={record} />
    </>
  );
}

function BodyWaveform({ capture, body }: { capture: Capture; body: ServedBody }) {
  const channels = useMemo(() => body.channels.map(({ channel }) => channel), [body]);
  const { fromS, toS } = body.settings;
  return <Waveform capture={capture} channels={channels} segment={{ fromS, toS }} />;
}

function NoSuchPart({ count }: { count: number }) {
  const [params] = useSearchParams();
  return (
    <FailedState what="The programme has no such part." why={`It has ${count}.`}>
      <p>
        <Link to={{ search: partSearch(params, null) }}>To all parts</Link>
      </p>
    </FailedState>
  );
}
