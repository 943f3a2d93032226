import { Button } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { NewestCaptures } from '@/components/captures/newest-captures';
import { Columns, Facts, MarginBlock, Page, Section } from '@/components/page/page';
import { PageHead } from '@/components/page/page-head';
import { FailedState, LoadingState, NoRows } from '@/components/states/states';
import type { Rig } from '@/lib/api-schema';
import { unitName } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { formatCount, formatLevel } from '@/lib/format/quantity';
import { rigQueries } from '@/lib/queries/units';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { RigBaselines } from './rig-baselines';
import { RigCalibrations } from './rig-calibrations';
import { RigDialog } from './rig-dialog';
import './rigs.css';

/** One rig: its calibrations, its baselines, what was captured with it; facts in the margin. */
export function RigPage({ rigId }: { rigId: string }) {
  const rig = useQuery(rigQueries.detail(rigId));
  if (rig.data) return <RigView rig={rig.data} />;
  return (
    <Page>
      <PageHead title="Rig" crumbs={[{ label: 'Rigs', to: '/rigs' }]} hasDivider />
      {rig.isPending ? (
        <LoadingState what="Fetching the rig" />
      ) : (
        <FailedState
          what="The rig could not be fetched."
          why={errorWords(rig.error)}
          onRetry={() => void rig.refetch()}
        />
      )}
    </Page>
  );
}

function RigView({ rig }: { rig: Rig }) {
  const canWrite = canWriteCaptures(usePerson());
  const [isChanging, setIsChanging] = useState(false);
  const [isCalibrating, setIsCalibrating] = useState(false);
  return (
    <Page>
      <PageHead
        title={rig.name}
        crumbs={[{ label: 'Rigs', to: '/rigs' }]}
        sub={rig.interface === '' ? 'Its interface is not noted.' : rig.interface}
        actions={
          canWrite && (
            <>
              <Button variant="surface" color="gray" highContrast onClick={() => setIsChanging(true)}>
                Change the facts
              </Button>
              <Button onClick={() => setIsCalibrating(true)}>Add a calibration</Button>
            </>
          )
        }
        hasDivider
      />
      <Columns margin={<RigMargin rig={rig} />}>
        <RigCalibrations
          rigId={rig.id}
          canWrite={canWrite}
          isAdding={isCalibrating}
          onAddingChange={setIsCalibrating}
        />
        <RigBaselines rigId={rig.id} canWrite={canWrite} />
        <Section title="Captures">
          <NewestCaptures
            filter={{ rigId: rig.id }}
            archiveAddress={`/archive?rig=${rig.id}`}
            label="Captures made with this rig"
            filing={{
              head: 'unit',
              cell: ({ unit, condition }) => (
                <>
                  {unit ? unitName(unit) : 'no unit'}
                  <span className="bl-table-second">{condition?.name}</span>
                </>
              ),
            }}
            none={
              <NoRows asked="Nothing was captured with this rig yet.">
                File a recording under it in the archive.
              </NoRows>
            }
          />
        </Section>
      </Columns>
      <RigDialog
        rig={rig}
        isOpen={isChanging}
        onOpenChange={setIsChanging}
        onSaved={() => setIsChanging(false)}
      />
    </Page>
  );
}

function RigMargin({ rig }: { rig: Rig }) {
  const fact = (detail: string) => (detail === '' ? 'not noted' : detail);
  return (
    <>
      <MarginBlock title="Facts">
        <Facts
          facts={[
            { term: 'interface', detail: fact(rig.interface) },
            { term: 'source', detail: fact(rig.source) },
            { term: 'cables', detail: fact(rig.cables) },
            { term: 'supply', detail: fact(rig.supply) },
            { term: 'load', detail: fact(rig.load) },
            {
              term: 'plays at most',
              detail: rig.limitDbfs === null ? 'full scale: no limit of its own' : formatLevel(rig.limitDbfs),
            },
            { term: 'on the books', detail: `since ${formatDate(rig.createdAt)}` },
            {
              term: 'captures',
              detail: (
                <Link to={`/archive?rig=${rig.id}`}>{formatCount(rig.captureCount)} in the archive</Link>
              ),
            },
          ]}
        />
      </MarginBlock>
      {rig.notes !== '' && (
        <MarginBlock title="Notes">
          <p className="bl-rig-notes">{rig.notes}</p>
        </MarginBlock>
      )}
      <MarginBlock title="Cautions">
        <p>
          While a tone plays, the terminals are live, and those of a power amplifier can be dangerous to
          touch. Take loudspeakers and headphones off first. Leave anything that is connected to the mains to
          qualified people and keep to the local codes.
        </p>
      </MarginBlock>
    </>
  );
}
