import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { MainFigure } from '@/components/captures/main-figure';
import { Sketch } from '@/components/figures/sketch';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import type { Unit } from '@/lib/api-schema';
import { whatWasMeasured } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { formatCount } from '@/lib/format/quantity';
import { captureQueries } from '@/lib/queries/captures';

const SHOWN = 20;

/** The newest captures of a unit; the archive has them all. */
export function UnitCaptures({ unit }: { unit: Unit }) {
  const captures = useQuery(
    captureQueries.some({ unitId: unit.id, sort: 'uploadedAt', order: 'desc', limit: SHOWN }),
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
  if (items.length === 0) {
    return (
      <NoRows asked="Nothing was measured of this unit yet.">
        File a recording under it in the archive.
      </NoRows>
    );
  }
  return (
    <>
      <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Captures of this unit">
        <table className="bl-table bl-table-rows bl-unit-captures">
          <thead>
            <tr>
              <th scope="col">capture</th>
              <th scope="col">drawing</th>
              <th scope="col">what was measured</th>
              <th scope="col">condition</th>
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
                  <td>
                    {capture.condition?.name}
                    <span className="bl-table-second">{capture.rig?.name}</span>
                  </td>
                  <td>{capture.record?.mainFigure && <MainFigure main={capture.record.mainFigure} />}</td>
                </tr>
              );
            })}
          </tbody>
        </table>
      </div>
      {total > items.length && (
        <p className="bl-unit-more">
          <Link to={`/archive?unit=${unit.id}`}>All {formatCount(total)} in the archive</Link>
        </p>
      )}
    </>
  );
}
