import { Button } from '@radix-ui/themes';
import { FormError } from '@/components/forms/field';
import { LoadingState } from '@/components/states/states';
import type { Capture } from '@/lib/api-schema';
import { STATE_WORDS } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatCounted, formatPercent } from '@/lib/format/quantity';
import { canWriteCaptures, usePerson } from '@/lib/use-session';
import { useCancelAnalysis, useRetryAnalysis } from '../api/capture-actions';
import { Waveform } from './waveform';

/** A capture without a record yet: on its way, stopped, or failed with the reason. */
export function NoRecord({ capture }: { capture: Capture }) {
  const isOnItsWay = capture.state === 'queued' || capture.state === 'analysing';
  return (
    <>
      {isOnItsWay ? <OnItsWay capture={capture} /> : <Stopped capture={capture} />}
      <Waveform capture={capture} channels={['left', 'right']} segment={null} />
    </>
  );
}

function OnItsWay({ capture }: { capture: Capture }) {
  const cancel = useCancelAnalysis();
  const canWrite = canWriteCaptures(usePerson());
  const { jobId } = capture;
  return (
    <>
      <LoadingState
        what={
          capture.state === 'queued'
            ? 'The recording is stored and waits for the analyser'
            : 'The recording is being analysed'
        }
        share={capture.progress}
        amount={capture.progress === null ? undefined : formatPercent(capture.progress)}
      />
      {canWrite && jobId !== null && (
        <p className="bl-capture-keep">
          <Button
            variant="surface"
            color="gray"
            highContrast
            disabled={cancel.isPending}
            onClick={() => cancel.mutate(jobId)}
          >
            Stop the analysis
          </Button>
        </p>
      )}
    </>
  );
}

function Stopped({ capture }: { capture: Capture }) {
  const retry = useRetryAnalysis(capture);
  const canWrite = canWriteCaptures(usePerson());
  const { failure } = capture;
  return (
    <div className="bl-state" role="alert">
      <p>
        <strong>
          {capture.state === 'failed' ? 'The analysis failed.' : `No record: ${STATE_WORDS[capture.state]}.`}
        </strong>
      </p>
      {failure && (
        <p>
          {failure.message} Tried {formatCounted(failure.attempts, 'time')}. <code>{failure.code}</code>
        </p>
      )}
      <p>The recording is safe.</p>
      {canWrite && (
        <Button disabled={retry.isPending} onClick={() => retry.mutate()}>
          Try again
        </Button>
      )}
      {retry.error && <FormError>{errorWords(retry.error)}</FormError>}
    </div>
  );
}
