import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link, useNavigate } from 'react-router-dom';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import type { Rig } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatCount, formatCounted, formatLevel } from '@/lib/format/quantity';
import { rigQueries } from '@/lib/queries/units';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { rigCalibrationWords } from '../model/calibration-words';
import { RigDialog } from './rig-dialog';
import './rigs.css';

/** The chains that units are measured with. */
export function RigsPage() {
  const rigs = useQuery(rigQueries.list());
  const canAdd = canWriteCaptures(usePerson());
  const navigate = useNavigate();
  const [isAdding, setIsAdding] = useState(false);
  const items = rigs.data?.items;
  return (
    <Page>
      <PageHead
        title="Rigs"
        sub={
          items ? `${formatCounted(items.length, 'chain')} to measure with.` : 'The chains to measure with.'
        }
        actions={canAdd && <Button onClick={() => setIsAdding(true)}>Add a rig</Button>}
        hasDivider
      />
      {rigs.isPending && <LoadingState what="Fetching the rigs" />}
      {rigs.isError && (
        <FailedState
          what="The rigs could not be fetched."
          why={errorWords(rigs.error)}
          onRetry={() => void rigs.refetch()}
        />
      )}
      {items?.length === 0 && (
        <NoRows asked="No rig is on the books yet.">
          Add the first one: a capture says with which rig it was made.
        </NoRows>
      )}
      {items && items.length > 0 && <RigTable rigs={items} />}
      <RigDialog
        isOpen={isAdding}
        onOpenChange={setIsAdding}
        onSaved={(id) => void navigate(`/rigs/${id}`)}
      />
    </Page>
  );
}

function RigTable({ rigs }: { rigs: readonly Rig[] }) {
  return (
    <div className="bl-table-scroll bl-rigs-list" tabIndex={0} role="region" aria-label="Rigs">
      <table className="bl-table bl-table-rows bl-rigs-table">
        <thead>
          <tr>
            <th scope="col">rig</th>
            <th scope="col">load</th>
            <th scope="col">input calibration</th>
            <th scope="col">plays at most</th>
            <th scope="col" className="bl-table-number">
              captures
            </th>
          </tr>
        </thead>
        <tbody>
          {rigs.map((rig) => (
            <tr key={rig.id}>
              <th scope="row">
                <Link to={`/rigs/${rig.id}`}>{rig.name}</Link>
                {rig.interface !== '' && <span className="bl-table-second">{rig.interface}</span>}
              </th>
              <td>{rig.load}</td>
              <td className={rig.calibrationState === 'expired' ? 'bl-rig-stale' : undefined}>
                {rigCalibrationWords(rig)}
              </td>
              <td>{rig.limitDbfs === null ? 'full scale' : formatLevel(rig.limitDbfs)}</td>
              <td className="bl-table-number bl-mono">{formatCount(rig.captureCount)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
