import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { TheLine } from '@/components/line/the-line';
import type { Station } from '@/components/line/the-line';
import { Columns, Facts, MarginBlock, Page, Section } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState } from '@/components/states/states';
import type { Unit, UnitCondition } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { formatCount, formatCounted } from '@/lib/format/quantity';
import { unitQueries } from '@/lib/queries/units';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { KIND_WORDS } from '../model/unit-forms';
import { ConditionDialog } from './condition-dialog';
import { UnitCaptures } from './unit-captures';
import { UnitDialog } from './unit-dialog';
import './units.css';

/** One unit: its life as the line, its captures, its conditions, facts in the margin. */
export function UnitPage({ unitId }: { unitId: string }) {
  const unit = useQuery(unitQueries.detail(unitId));
  if (unit.data) return <UnitView unit={unit.data} />;
  return (
    <Page>
      <PageHead title="Unit" crumbs={[{ label: 'Units', to: '/units' }]} hasDivider />
      {unit.isPending ? (
        <LoadingState what="Fetching the unit" />
      ) : (
        <FailedState
          what="The unit could not be fetched."
          why={errorWords(unit.error)}
          onRetry={() => void unit.refetch()}
        />
      )}
    </Page>
  );
}

function UnitView({ unit }: { unit: Unit }) {
  const canWrite = canWriteCaptures(usePerson());
  const [isChanging, setIsChanging] = useState(false);
  const [isAdding, setIsAdding] = useState(false);
  const conditions = inTime(unit.conditions);
  return (
    <Page>
      <PageHead
        title={`${unit.maker} ${unit.model}`}
        crumbs={[{ label: 'Units', to: '/units' }, { label: KIND_WORDS[unit.kind] }]}
        sub={unit.serialNumber ? `No. ${unit.serialNumber}` : 'Without a serial number'}
        actions={
          canWrite && (
            <>
              <Button variant="surface" color="gray" highContrast onClick={() => setIsChanging(true)}>
                Change the facts
              </Button>
              <Button onClick={() => setIsAdding(true)}>Add a condition</Button>
            </>
          )
        }
        line={
          conditions.length > 0 && (
            <TheLine
              label="The unit's conditions in time"
              stations={stationsOf(unit, conditions)}
              now={nowWords(conditions)}
            />
          )
        }
        hasDivider
      />
      <Columns margin={<UnitMargin unit={unit} />}>
        <section aria-labelledby="unit-captures-title">
          <h2 id="unit-captures-title" className="bl-unit-first">
            Captures
          </h2>
          <UnitCaptures unit={unit} />
        </section>
        <Section title="Conditions">
          <ConditionTable unit={unit} conditions={conditions} canWrite={canWrite} />
        </Section>
      </Columns>
      <UnitDialog
        unit={unit}
        isOpen={isChanging}
        onOpenChange={setIsChanging}
        onSaved={() => setIsChanging(false)}
      />
      <ConditionDialog unitId={unit.id} isOpen={isAdding} onOpenChange={setIsAdding} />
    </Page>
  );
}

/** Dated ones in their order; the undated keep the order in which they were put down, before them. */
function inTime(conditions: readonly UnitCondition[]): readonly UnitCondition[] {
  return [...conditions].sort((a, b) => (a.startedOn ?? '').localeCompare(b.startedOn ?? ''));
}

function stationsOf(unit: Unit, conditions: readonly UnitCondition[]): Station[] {
  return conditions.map((condition, index) => ({
    name: condition.startedOn ? formatDate(condition.startedOn) : `condition ${index + 1}`,
    what: condition.name,
    more: (
      <Link to={`/archive?unit=${unit.id}&condition=${condition.id}`}>
        {formatCounted(condition.captureCount, 'capture')}
      </Link>
    ),
    node: index === conditions.length - 1 ? 'here' : 'done',
  }));
}

function nowWords(conditions: readonly UnitCondition[]): string {
  const last = conditions.at(-1);
  return last ? `Now ${last.name}: ${formatCounted(last.captureCount, 'capture')}.` : '';
}

interface ConditionTableProps {
  unit: Unit;
  conditions: readonly UnitCondition[];
  canWrite: boolean;
}

function ConditionTable({ unit, conditions, canWrite }: ConditionTableProps) {
  const [changing, setChanging] = useState<UnitCondition | null>(null);
  if (conditions.length === 0) {
    return (
      <p className="bl-ink-2">
        None is named yet. A capture belongs to a condition: begin with “as received”.
      </p>
    );
  }
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of conditions">
      <table className="bl-table">
        <thead>
          <tr>
            <th scope="col">condition</th>
            <th scope="col">supply and settings</th>
            <th scope="col">since</th>
            <th scope="col" className="bl-table-number">
              captures
            </th>
            {canWrite && (
              <th scope="col">
                <span className="bl-hidden">change</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {conditions.map((condition, index) => (
            <tr key={condition.id}>
              <th scope="row">
                {index === conditions.length - 1 ? <strong>{condition.name}</strong> : condition.name}
              </th>
              <td>{condition.notes}</td>
              <td>{condition.startedOn ? formatDate(condition.startedOn) : ''}</td>
              <td className="bl-table-number bl-mono">{formatCount(condition.captureCount)}</td>
              {canWrite && (
                <td>
                  <button
                    type="button"
                    className="bl-word"
                    aria-label={`Change ${condition.name}`}
                    onClick={() => setChanging(condition)}
                  >
                    Change
                  </button>
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </table>
      {changing && (
        <ConditionDialog
          key={changing.id}
          unitId={unit.id}
          condition={changing}
          isOpen
          onOpenChange={(isOpen) => {
            if (!isOpen) setChanging(null);
          }}
        />
      )}
    </div>
  );
}

function UnitMargin({ unit }: { unit: Unit }) {
  return (
    <>
      <MarginBlock title="Facts">
        <Facts
          facts={[
            { term: 'maker', detail: unit.maker },
            { term: 'model', detail: unit.model },
            { term: 'serial', detail: unit.serialNumber ? <code>{unit.serialNumber}</code> : 'not noted' },
            { term: 'kind', detail: KIND_WORDS[unit.kind] },
            { term: 'on the books', detail: `since ${formatDate(unit.createdAt)}` },
            { term: 'captures', detail: formatCount(unit.captureCount) },
          ]}
        />
      </MarginBlock>
      {unit.notes !== '' && (
        <MarginBlock title="Notes">
          <p className="bl-unit-notes">{unit.notes}</p>
        </MarginBlock>
      )}
      <MarginBlock title="Cautions">
        <p>
          Opening a unit may end its warranty and its safety approval. It can hold dangerous voltage long
          after it is unplugged: leave its mains circuits to qualified people and keep to the local codes.
        </p>
      </MarginBlock>
    </>
  );
}
