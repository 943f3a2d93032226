import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { Columns, Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState } from '@/components/states/states';
import { ApiError } from '@/lib/api-error';
import type { Capture } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { captureQueries } from '@/lib/queries/captures';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { recordQueries } from '../api/record-queries';
import type { ServedRecordDetail } from '../api/record-queries';
import './capture.css';
import { CaptureFiling } from './capture-filing';
import { FindingsBlock } from './findings-block';
import { CaptureHead } from './capture-head';
import { MethodBlock } from './method-block';
import { NoRecord } from './no-record';
import { ProvenanceBlock } from './provenance-block';
import { RecordView } from './record-view';
import { RecordsBlock } from './records-block';
import { VerifyBlock } from './verify-block';
import { WarningsBlock } from './warnings-block';

export interface CapturePageProps {
  captureId: string;
  /** An older record that was asked for; the current one when null. */
  recordId: string | null;
  /** The part of a programme that is open: 1, 2, 3 ...; the whole when null. */
  part?: number | null;
}

/** A capture and one of its records: what was measured, left; what it means and where it is from, right. */
export function CapturePage({ captureId, recordId, part = null }: CapturePageProps) {
  const capture = useQuery(captureQueries.detail(captureId));
  if (capture.data)
    return (
      <CaptureView
        capture={capture.data}
        recordId={recordId ?? capture.data.record?.id ?? null}
        part={part}
      />
    );
  const isUnknown = capture.error instanceof ApiError && capture.error.status === 404;
  return (
    <Page>
      <PageHead title="Capture" hasDivider />
      {capture.isPending ? (
        <LoadingState what="Fetching the capture" />
      ) : (
        <FailedState
          what={isUnknown ? 'There is no such capture.' : 'The capture could not be fetched.'}
          why={isUnknown ? 'The address may be cut short.' : errorWords(capture.error)}
          onRetry={isUnknown ? undefined : () => void capture.refetch()}
        >
          <p>
            <Link to="/archive">To the archive</Link>
          </p>
        </FailedState>
      )}
    </Page>
  );
}

interface CaptureViewProps {
  capture: Capture;
  recordId: string | null;
  part: number | null;
}

function CaptureView({ capture, recordId, part }: CaptureViewProps) {
  const record = useQuery({ ...recordQueries.detail(recordId ?? ''), enabled: recordId !== null });
  const detail = record.data?.captureId === capture.id ? record.data : null;
  return (
    <Page>
      <CaptureHead capture={capture} detail={detail} />
      <Columns margin={<CaptureMargin capture={capture} detail={detail} recordId={recordId} part={part} />}>
        {recordId === null && <NoRecord capture={capture} />}
        {recordId !== null && record.isPending && <LoadingState what="Fetching the record" />}
        {record.isError && (
          <FailedState
            what="The record could not be fetched."
            why={errorWords(record.error)}
            onRetry={() => void record.refetch()}
          />
        )}
        {record.data && !detail && <FailedState what="This record is of another capture." />}
        {detail && <RecordView key={detail.id} capture={capture} detail={detail} part={part} />}
      </Columns>
    </Page>
  );
}

interface CaptureMarginProps {
  capture: Capture;
  detail: ServedRecordDetail | null;
  recordId: string | null;
  part: number | null;
}

function CaptureMargin({ capture, detail, recordId, part }: CaptureMarginProps) {
  const canWrite = canWriteCaptures(usePerson());
  const shown = part === null ? null : (detail?.record.segments[part - 1] ?? null);
  return (
    <>
      {detail && <FindingsBlock record={detail.record} />}
      <WarningsBlock capture={capture} record={shown ?? detail?.record ?? null} />
      <CaptureFiling capture={capture} canWrite={canWrite} />
      <ProvenanceBlock capture={capture} record={detail?.record ?? null} />
      {detail && <MethodBlock capture={capture} record={detail.record} canWrite={canWrite} />}
      {detail && <VerifyBlock key={detail.id} captureId={capture.id} recordId={detail.id} />}
      <RecordsBlock captureId={capture.id} shownId={recordId} />
    </>
  );
}
