import { useQuery } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { Sketch } from '@/components/figures/sketch';
import { FailedState, LoadingState } from '@/components/states/states';
import type { Capture, CaptureListQuery } from '@/lib/api-schema';
import { whatWasMeasured } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { formatCount } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';
import { MainFigure } from './main-figure';
import './newest-captures.css';

const SHOWN = 20;

export interface NewestCapturesProps {
  /** Which captures. */
  filter: Pick<CaptureListQuery, 'unitId' | 'rigId'>;
  /** The same in the archive. */
  archiveAddress: string;
  /** Names the table: "Captures of this unit". */
  label: string;
  /** The column between what was measured and the main figure. */
  filing: { head: string; cell: (capture: Capture) => ReactNode };
  /** Instead of the table when there is none. */
  none: ReactNode;
}

/** The newest captures of a thing; the archive has them all. */
export function NewestCaptures({ filter, archiveAddress, label, filing, none }: NewestCapturesProps) {
  const captures = useQuery(
    captureQueries.some({ ...filter, sort: 'uploadedAt', order: 'desc', limit: SHOWN }),
  );
  if (captures.isPending) return <LoadingState what="Fetching the captures" />;
  if (captures.isError) {
    return (
      <FailedState
        what="The captures could not be fetched."
        why={errorWords(captures.error)}
        onRetry={() => void captures.refetch()}
      />
    );
  }
  const { items, total } = captures.data;
  if (items.length === 0) return none;
  return (
    <>
      <div className="bl-table-scroll" tabIndex={0} role="region" aria-label={label}>
        <table className="bl-table bl-table-rows bl-newest-captures">
          <thead>
            <tr>
              <th scope="col">capture</th>
              <th scope="col">drawing</th>
              <th scope="col">what was measured</th>
              <th scope="col">{filing.head}</th>
              <th scope="col">main figure</th>
            </tr>
          </thead>
          <tbody>
            {items.map((capture) => {
              const { title, detail } = whatWasMeasured(capture);
              return (
                <tr key={capture.id}>
                  <th scope="row">
                    <Link to={`/captures/${capture.id}`} className="bl-mono">
                      {capture.number}
                    </Link>
                    <span className="bl-table-second">{formatDate(capture.uploadedAt)}</span>
                  </th>
                  <td>{capture.record && <Sketch channels={capture.record.sketch} />}</td>
                  <td>
                    {title}
                    <span className="bl-table-second">{detail}</span>
                  </td>
                  <td>{filing.cell(capture)}</td>
                  <td>{capture.record?.mainFigure && <MainFigure main={capture.record.mainFigure} />}</td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      {total > items.length && (
        <p className="bl-newest-captures-more">
          <Link to={archiveAddress}>All {formatCount(total)} in the archive</Link>
        </p>
      )}
    </>
  );
}
