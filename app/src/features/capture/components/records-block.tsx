import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { MarginBlock } from '@/components/page/page';
import { measureTitle } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { captureQueries } from '@/lib/queries/captures';

/** All records of the capture, newest first; none is ever changed or thrown away. */
export function RecordsBlock({ captureId, shownId }: { captureId: string; shownId: string | null }) {
  const records = useQuery(captureQueries.records(captureId));
  if (records.isError) {
    return (
      <MarginBlock title="Records of this capture">
        <p>{errorWords(records.error)}</p>
      </MarginBlock>
    );
  }
  const items = [...(records.data?.items ?? [])].sort((a, b) => b.ordinal - a.ordinal);
  if (items.length === 0) return null;
  return (
    <MarginBlock title="Records of this capture">
      <ul className="bl-record-list">
        {items.map((record) => (
          <li key={record.id}>
            {record.id === shownId ? (
              <strong aria-current="true">record {record.ordinal}</strong>
            ) : (
              <Link to={`/captures/${captureId}?record=${record.id}`}>record {record.ordinal}</Link>
            )}
            <span>
              {formatDate(record.createdAt)}, {measureTitle(record.measure)}, dsp{' '}
              <code>{record.dspVersion}</code>
              {record.supersededById ? ', superseded' : ', current'}
            </span>
          </li>
        ))}
      </ul>
    </MarginBlock>
  );
}
