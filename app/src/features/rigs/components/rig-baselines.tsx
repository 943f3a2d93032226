import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { Link } from 'react-router-dom';
import { ConfirmDialog } from '@/components/forms/confirm-dialog';
import { Section } from '@/components/page/page';
import { FailedState, LoadingState } from '@/components/states/states';
import { api, unwrap } from '@/lib/api-client';
import type { RigBaseline } from '@/lib/api-schema';
import { measureTitle } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDate } from '@/lib/format/date';
import { formatSampleRate } from '@/lib/format/quantity';
import { rigQueries } from '@/lib/queries/units';
import { BaselineDialog } from './baseline-dialog';

/** The rig measured without a unit: what its figures can't go below. */
export function RigBaselines({ rigId, canWrite }: { rigId: string; canWrite: boolean }) {
  const baselines = useQuery(rigQueries.baselines(rigId));
  const [isNaming, setIsNaming] = useState(false);
  const [retiring, setRetiring] = useState<RigBaseline | null>(null);
  const items = baselines.data?.items;
  return (
    <Section
      title="Baselines"
      sub="the rig alone, with a cable in the unit’s place"
      tools={
        canWrite && (
          <button type="button" className="bl-word" onClick={() => setIsNaming(true)}>
            Name a baseline
          </button>
        )
      }
    >
      {baselines.isPending && <LoadingState what="Fetching the baselines" />}
      {baselines.isError && (
        <FailedState
          what="The baselines could not be fetched."
          why={errorWords(baselines.error)}
          onRetry={() => void baselines.refetch()}
        />
      )}
      {items?.length === 0 && (
        <p className="bl-ink-2">
          There is none yet: nothing tells where a figure is the rig’s own. Record a programme through a cable
          alone, file it under this rig and name it here.
        </p>
      )}
      {items && items.length > 0 && (
        <BaselineTable baselines={items} onRetire={canWrite ? setRetiring : undefined} />
      )}
      {isNaming && <BaselineDialog rigId={rigId} onClose={() => setIsNaming(false)} />}
      {retiring && (
        <RetireBaseline
          key={retiring.id}
          rigId={rigId}
          baseline={retiring}
          onClose={() => setRetiring(null)}
        />
      )}
    </Section>
  );
}

interface BaselineTableProps {
  baselines: readonly RigBaseline[];
  onRetire?: (baseline: RigBaseline) => void;
}

function BaselineTable({ baselines, onRetire }: BaselineTableProps) {
  return (
    <div className="bl-table-scroll" tabIndex={0} role="region" aria-label="Table of baselines">
      <table className="bl-table bl-calibrations">
        <thead>
          <tr>
            <th scope="col">capture</th>
            <th scope="col">range</th>
            <th scope="col">rate</th>
            <th scope="col">named</th>
            <th scope="col">state</th>
            {onRetire && (
              <th scope="col">
                <span className="bl-hidden">retire</span>
              </th>
            )}
          </tr>
        </thead>
        <tbody>
          {baselines.map((baseline) => (
            <tr key={baseline.id}>
              <th scope="row">
                <Link to={`/captures/${baseline.captureId}`} className="bl-mono">
                  {baseline.captureNumber}
                </Link>
                <span className="bl-table-second">{measureTitle(baseline.measure)}</span>
              </th>
              <td>{baseline.inputRange}</td>
              <td>{formatSampleRate(baseline.sampleRateHz)}</td>
              <td>
                {formatDate(baseline.createdAt)}
                <span className="bl-table-second">{baseline.createdBy.displayName}</span>
              </td>
              <td>{baselineWords(baseline)}</td>
              {onRetire && (
                <td>
                  {baseline.retiredAt === null && (
                    <button
                      type="button"
                      className="bl-word"
                      aria-label={`Retire the baseline of capture ${baseline.captureNumber}, ${baseline.inputRange}`}
                      onClick={() => onRetire(baseline)}
                    >
                      Retire
                    </button>
                  )}
                </td>
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}

function baselineWords({ retiredAt, hasNewerRecord }: RigBaseline): string {
  if (retiredAt !== null) return `retired on ${formatDate(retiredAt)}`;
  return hasNewerRecord ? 'in use; the capture was analysed again since' : 'in use';
}

interface RetireBaselineProps {
  rigId: string;
  baseline: RigBaseline;
  onClose: () => void;
}

function RetireBaseline({ rigId, baseline, onClose }: RetireBaselineProps) {
  const queryClient = useQueryClient();
  const retire = useMutation({
    mutationFn: () => {
      const path = { id: rigId, baselineId: baseline.id };
      return unwrap(api.DELETE('/api/rigs/{id}/baselines/{baselineId}', { params: { path } }));
    },
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: rigQueries.all() });
      onClose();
    },
  });
  return (
    <ConfirmDialog
      isOpen
      onOpenChange={(isOpen) => {
        if (!isOpen) onClose();
      }}
      title={`Retire capture ${baseline.captureNumber} as a baseline?`}
      confirmLabel="Retire it"
      isDestructive
      isBusy={retire.isPending}
      error={retire.isError ? errorWords(retire.error) : null}
      onConfirm={() => retire.mutate()}
    >
      The capture and its records stay. New analyses can’t be held against it, and records that were keep it.
    </ConfirmDialog>
  );
}
