import { useQuery } from '@tanstack/react-query';
import { Navigate } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState } from '@/components/states/states';
import { errorWords } from '@/lib/error-words';
import { recordQueries } from '../api/record-queries';

/** A record's own address, as it stands under a chart that was printed: leads to its capture's page. */
export function RecordAddress({ recordId }: { recordId: string }) {
  const record = useQuery(recordQueries.detail(recordId));
  if (record.data) return <Navigate to={`/captures/${record.data.captureId}?record=${recordId}`} replace />;
  return (
    <Page>
      <PageHead title="Record" hasDivider />
      {record.isPending ? (
        <LoadingState what="Looking for the record" />
      ) : (
        <FailedState
          what="The record could not be fetched."
          why={errorWords(record.error)}
          onRetry={() => void record.refetch()}
        />
      )}
    </Page>
  );
}
