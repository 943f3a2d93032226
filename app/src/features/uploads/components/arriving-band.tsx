import { useState } from 'react';
import { FilingSlots } from '@/components/filing/filing-slots';
import { NewRigDialog } from '@/components/filing/new-rig-dialog';
import { Sentence } from '@/components/sentence/slot';
import { SpokenStatus } from '@/components/states/states';
import { formatCounted } from '@/lib/format/quantity';
import { useFilingChoices } from '@/lib/use-filing-choices';
import { useUploadEntries, useUploadQueue } from '../hooks/uploads-context';
import { isOnItsWay, isSettled } from '../model/upload-entry';
import type { BatchFiling, UploadEntry } from '../model/upload-entry';
import './uploads.css';
import { UploadRow } from './upload-row';

export interface ArrivingBandProps {
  filing: BatchFiling;
  onFilingChange: (filing: BatchFiling) => void;
  /** Said when a folder held more than recordings. */
  notice: string | null;
}

/** The files on their way, and where the next ones will be filed. */
export function ArrivingBand({ filing, onFilingChange, notice }: ArrivingBandProps) {
  const queue = useUploadQueue();
  const entries = useUploadEntries();
  const { units, rigs } = useFilingChoices();
  const [isNamingRig, setIsNamingRig] = useState(false);
  const settled = entries.filter(isSettled).length;

  return (
    <section className="bl-arriving" aria-labelledby="arriving-title">
      <div className="bl-arriving-head">
        <h2 id="arriving-title">Arriving</h2>
        <p>
          {entries.length > 0 ? `${formatCounted(entries.length, 'file')}, or` : 'nothing now;'} drop WAV
          files or folders anywhere on this page
        </p>
        {settled > 1 && (
          <button type="button" className="bl-word" onClick={() => queue.putAwaySettled()}>
            Put away what is done
          </button>
        )}
      </div>
      <Sentence>
        What is added next is filed under{' '}
        <FilingSlots
          units={units}
          rigs={rigs}
          value={{
            unitId: filing.unitId ?? null,
            conditionId: filing.conditionId ?? null,
            rigId: filing.rigId ?? null,
          }}
          onChange={({ unitId, conditionId, rigId }) =>
            onFilingChange({
              unitId: unitId ?? undefined,
              conditionId: conditionId ?? undefined,
              rigId: rigId ?? undefined,
            })
          }
          onNewRig={() => setIsNamingRig(true)}
        />
        .
      </Sentence>
      {notice && <p className="bl-arriving-note">{notice}</p>}
      {entries.length > 0 && (
        <ul className="bl-arriving-list">
          {entries.map((entry) => (
            <UploadRow
              key={entry.id}
              entry={entry}
              onCancel={() => queue.cancel(entry.id)}
              onRetry={() => queue.retry(entry.id)}
              onPutAway={() => queue.putAway(entry.id)}
            />
          ))}
        </ul>
      )}
      <SpokenStatus>{spokenState(entries)}</SpokenStatus>
      <NewRigDialog
        isOpen={isNamingRig}
        onOpenChange={setIsNamingRig}
        onMade={(rig) => onFilingChange({ ...filing, rigId: rig.id })}
      />
    </section>
  );
}

/** Only what changes seldom is said aloud: percentages would never stop talking. */
function spokenState(entries: readonly UploadEntry[]): string {
  if (entries.length === 0) return '';
  const onTheirWay = entries.filter(isOnItsWay).length;
  const refused = entries.filter(({ phase }) => phase === 'refused').length;
  const stored = entries.filter(({ phase }) => phase === 'stored').length;
  return `${onTheirWay} on their way, ${stored} stored, ${refused} refused`;
}
