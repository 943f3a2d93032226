import { useMemo } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { Capture } from '@/lib/api-schema';
import type { ServedBody, ServedRecordDetail } from '../api/record-queries';
import { partSearch } from '../model/part-address';
import { FailedState } from '@/components/states/states';
import { Link } from 'react-router-dom';
import { ComponentsTable } from './components-table';
import { BetweenSection, FiguresSection } from './figures-section';
import { HarmonicsTable } from './harmonics-table';
import type { BodyView } from './measures/body-view';
import { MeasureView } from './measures/measure-view';
import { PartHead } from './parts/part-head';
import { PartsTable } from './parts/parts-table';
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
      </>
    );
  }
  return <MeasuredBody view={{ capture, detail, body: record, segment: null }} />;
}

function MeasuredBody({ view }: { view: BodyView }) {
  const { capture, body } = view;
  return (
    <>
      {body.segments.length > 0 && <PartsTable parts={body.segments} />}
      <MeasureView view={view} />
      <FiguresSection record={body} />
      <BetweenSection record={body} />
      <HarmonicsTable record={body} />
      <ComponentsTable record={body} />
      <BodyWaveform capture={capture} body={body} />
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
