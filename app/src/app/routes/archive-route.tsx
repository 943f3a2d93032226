import { useQuery } from '@tanstack/react-query';
import { useLocation } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { ArchiveList } from '@/features/archive/components/archive-list';
import { AddRecordings } from '@/features/uploads/components/add-recordings';
import { ArrivingBand } from '@/features/uploads/components/arriving-band';
import { useArrivals } from '@/features/uploads/hooks/use-arrivals';
import { useDropAnywhere } from '@/features/uploads/hooks/use-drop-anywhere';
import { formatBytes, formatCounted } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';
import { canWriteCaptures, usePerson } from '@/lib/use-session';

/** The archive: what is arriving, and what is there. */
export function Component() {
  const canAdd = canWriteCaptures(usePerson());
  const arrivals = useArrivals();
  const isOver = useDropAnywhere(canAdd, arrivals.take);
  const location = useLocation();
  const state: unknown = location.state;
  const isAsked = typeof state === 'object' && state !== null && 'add' in state;
  return (
    <Page>
      <PageHead
        title="Archive"
        sub={<Holdings />}
        actions={
          canAdd && <AddRecordings onPicked={arrivals.take} askedFor={isAsked ? location.key : null} />
        }
      />
      {canAdd && (
        <ArrivingBand
          filing={arrivals.filing}
          onFilingChange={arrivals.changeFiling}
          notice={arrivals.notice}
        />
      )}
      <ArchiveList />
      {isOver && <div className="bl-drop-veil">Drop the recordings to add them</div>}
    </Page>
  );
}

function Holdings() {
  const { data } = useQuery(captureQueries.some({ limit: 1 }));
  const kept = 'Each recording is kept as it came and known by its bytes.';
  if (!data) return <>{kept}</>;
  return (
    <>
      {formatCounted(data.totalAll, 'capture')}, {formatBytes(data.totalBytes)}. {kept}
    </>
  );
}
