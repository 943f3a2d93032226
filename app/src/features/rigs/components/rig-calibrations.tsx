import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { WarningBlock } from '@/components/page/page';
import { FailedState, LoadingState } from '@/components/states/states';
import type { RigCalibration } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { formatDay } from '@/lib/format/date';
import { rigQueries } from '@/lib/queries/units';
import { DIRECTION_WORDS, endingWords, isStale } from '../model/calibration-words';
import { CalibrationDialog } from './calibration-dialog';
import { CalibrationTable } from './calibration-table';
import { RetireCalibration } from './retire-calibration';

export interface RigCalibrationsProps {
  rigId: string;
  canWrite: boolean;
  isAdding: boolean;
  onAddingChange: (isAdding: boolean) => void;
}

/** Volts at full scale as they were measured, with what is stale said first. */
export function RigCalibrations({ rigId, canWrite, isAdding, onAddingChange }: RigCalibrationsProps) {
  const calibrations = useQuery(rigQueries.calibrations(rigId));
  const [retiring, setRetiring] = useState<RigCalibration | null>(null);
  const items = calibrations.data?.items;
  return (
    <section aria-labelledby="rig-calibrations-title">
      <div className="bl-rig-first">
        <h2 id="rig-calibrations-title">Calibrations</h2>
      </div>
      {calibrations.isPending && <LoadingState what="Fetching the calibrations" />}
      {calibrations.isError && (
        <FailedState
          what="The calibrations could not be fetched."
          why={errorWords(calibrations.error)}
          onRetry={() => void calibrations.refetch()}
        />
      )}
      {items?.length === 0 && (
        <p className="bl-ink-2">
          There is none yet: levels of this rig are known in dBFS alone, not in volts.
        </p>
      )}
      {items && items.length > 0 && (
        <>
          <StaleWarnings calibrations={items} onAgain={canWrite ? () => onAddingChange(true) : undefined} />
          <CalibrationTable calibrations={items} onRetire={canWrite ? setRetiring : undefined} />
        </>
      )}
      {isAdding && <CalibrationDialog rigId={rigId} onClose={() => onAddingChange(false)} />}
      {retiring && (
        <RetireCalibration key={retiring.id} calibration={retiring} onClose={() => setRetiring(null)} />
      )}
    </section>
  );
}

interface StaleWarningsProps {
  calibrations: readonly RigCalibration[];
  onAgain?: () => void;
}

function StaleWarnings({ calibrations, onAgain }: StaleWarningsProps) {
  const stale = calibrations.filter(isStale);
  const now = new Date();
  const ending = calibrations.flatMap((calibration) => {
    const words = endingWords(calibration, now);
    return words === null ? [] : [{ calibration, words }];
  });
  if (stale.length === 0 && ending.length === 0) return null;
  const again = onAgain && (
    <button type="button" className="bl-word" onClick={onAgain}>
      Calibrate again
    </button>
  );
  return (
    <div className="bl-rig-warnings">
      {stale.map((calibration) => (
        <WarningBlock
          key={calibration.id}
          lead={`The ${DIRECTION_WORDS[calibration.direction]}, ${calibration.range}, has an expired calibration.`}
          wayOut={again}
        >
          Volts by it are not backed since {formatDay(calibration.validUntil)}, and it is no longer offered
          for new takes. Records that were made with it stay as they are.
        </WarningBlock>
      ))}
      {ending.map(({ calibration, words }) => (
        <WarningBlock
          key={calibration.id}
          lead={`The calibration of the ${DIRECTION_WORDS[calibration.direction]}, ${calibration.range}, ${words}.`}
          wayOut={again}
        />
      ))}
    </div>
  );
}
