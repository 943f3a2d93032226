import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useDeferredValue, useState } from 'react';
import { Link, useNavigate, useSearchParams } from 'react-router-dom';
import { TextInput } from '@/components/forms/field';
import { Page } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import type { Unit } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatCount, formatCounted } from '@/lib/format/quantity';
import { unitQueries } from '@/lib/queries/units';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { KIND_WORDS } from '../model/unit-forms';
import { UnitDialog } from './unit-dialog';
import './units.css';

/** The devices on the books. */
export function UnitsPage() {
  const [params, setParams] = useSearchParams();
  const words = params.get('q') ?? '';
  const units = useQuery(unitQueries.list(useDeferredValue(words.trim())));
  const canAdd = canWriteCaptures(usePerson());
  const navigate = useNavigate();
  const [isAdding, setIsAdding] = useState(false);
  return (
    <Page>
      <PageHead
        title="Units"
        sub={
          units.data
            ? `${formatCounted(units.data.total, 'device')} on the books.`
            : 'The devices on the books.'
        }
        actions={canAdd && <Button onClick={() => setIsAdding(true)}>Add a unit</Button>}
        hasDivider
      />
      <div className="bl-units-words">
        <TextInput
          label="Words"
          type="search"
          placeholder="maker, model, number"
          value={words}
          onChange={({ target }) =>
            setParams(target.value === '' ? {} : { q: target.value }, { replace: true })
          }
        />
      </div>
      {units.isPending && <LoadingState what="Fetching the units" />}
      {units.isError && (
        <FailedState
          what="The units could not be fetched."
          why={errorWords(units.error)}
          onRetry={() => void units.refetch()}
        />
      )}
      {units.data?.items.length === 0 && (
        <NoRows asked={words === '' ? 'No unit is on the books yet.' : `No unit fits “${words}”.`}>
          {words === '' ? 'Add the first one: captures are filed under it.' : 'Take a word away.'}
        </NoRows>
      )}
      {units.data && units.data.items.length > 0 && <UnitTable units={units.data.items} />}
      <UnitDialog
        isOpen={isAdding}
        onOpenChange={setIsAdding}
        onSaved={(id) => void navigate(`/units/${id}`)}
      />
    </Page>
  );
}

function UnitTable({ units }: { units: readonly Unit[] }) {
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Units">
      <table className="bl-table bl-table-rows bl-units-table">
        <thead>
          <tr>
            <th scope="col">unit</th>
            <th scope="col">kind</th>
            <th scope="col">conditions</th>
            <th scope="col" className="bl-table-number">
              captures
            </th>
          </tr>
        </thead>
        <tbody>
          {units.map((unit) => (
            <tr key={unit.id}>
              <th scope="row">
                <Link to={`/units/${unit.id}`}>
                  {unit.maker} {unit.model}
                </Link>
                {unit.serialNumber && <span className="bl-table-second">no. {unit.serialNumber}</span>}
              </th>
              <td>{KIND_WORDS[unit.kind]}</td>
              <td>{unit.conditions.map(({ name }) => name).join(', ')}</td>
              <td className="bl-table-number bl-mono">{formatCount(unit.captureCount)}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
