import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { FormError } from '@/components/forms/field';
import { MarginBlock } from '@/components/page/page';
import { Sentence, SlotSelect, SlotText } from '@/components/sentence/slot';
import type { Capture } from '@/lib/api-schema';
import { MEASURE_CHOICES, measureTitle, STATE_WORDS } from '@/lib/capture-words';
import { errorWords } from '@/lib/error-words';
import { formatDuration, formatFrequency, formatPercent, formatPoints } from '@/lib/format/quantity';
import { useAnalyse, useCancelAnalysis } from '../api/capture-actions';
import type { ServedRecord } from '../api/record-queries';
import { checkMethod, isSameMethod, methodOf, toRequest } from '../model/method';
import type { Method } from '../model/method';
import { NumberSlot, usualValues } from '@/components/sentence/number-slot';

export interface MethodBlockProps {
  capture: Capture;
  record: ServedRecord;
  canWrite: boolean;
}

/** How it was measured, as a sentence; a changed word asks for another record. */
export function MethodBlock({ capture, record, canWrite }: MethodBlockProps) {
  const shown = methodOf(record);
  return (
    <MarginBlock title="Method">
      {canWrite ? (
        <MethodForm key={JSON.stringify(shown)} capture={capture} shown={shown} />
      ) : (
        <Sentence>
          Measured as <SlotText>{measureTitle(shown.measure)}</SlotText> from{' '}
          <SlotText>{formatDuration(shown.fromS)}</SlotText> to{' '}
          <SlotText>{formatDuration(shown.toS)}</SlotText>, looked at{' '}
          <SlotText>{formatFrequency(shown.bandLowHz)}</SlotText> to{' '}
          <SlotText>{formatFrequency(shown.bandHighHz)}</SlotText>, counted harmonics up to{' '}
          <SlotText>{shown.highestHarmonic}</SlotText>.
        </Sentence>
      )}
      <p className="bl-ink-2 bl-small">
        {record.settings.fftLength > 0
          ? `${formatPoints(record.settings.fftLength)} points, ${record.settings.window} window.`
          : 'Each part by its own points and window.'}
      </p>
      <RunningWords capture={capture} />
    </MarginBlock>
  );
}

function MethodForm({ capture, shown }: { capture: Capture; shown: Method }) {
  const [method, setMethod] = useState(shown);
  const analyse = useAnalyse(capture.id);
  const change = (part: Partial<Method>) => setMethod({ ...method, ...part });
  const wrong = checkMethod(method, capture);
  const isChanged = !isSameMethod(method, shown);
  const slot = (key: Exclude<keyof Method, 'measure'>) => ({
    value: method[key],
    error: wrong[key],
    isChanged: method[key] !== shown[key],
    onChange: (value: number) => change({ [key]: value }),
  });
  return (
    <>
      <Sentence>
        Measure it as{' '}
        <SlotSelect
          label="Measure"
          value={method.measure}
          isChanged={method.measure !== shown.measure}
          options={measureOptions(shown.measure)}
          onChange={(measure) => change({ measure })}
        />{' '}
        from{' '}
        <NumberSlot
          label="From"
          unit="s"
          text={formatDuration(method.fromS)}
          usual={usualValues([0], 's')}
          {...slot('fromS')}
        />{' '}
        to{' '}
        <NumberSlot
          label="To"
          unit="s"
          text={formatDuration(method.toS)}
          usual={[{ value: capture.durationS, text: 'the end' }]}
          {...slot('toS')}
        />
        , look at{' '}
        <NumberSlot
          label="Band from"
          unit="Hz"
          text={formatFrequency(method.bandLowHz)}
          usual={usualValues([10, 20, 100, 400], 'Hz')}
          {...slot('bandLowHz')}
        />{' '}
        to{' '}
        <NumberSlot
          label="Band to"
          unit="Hz"
          text={formatFrequency(method.bandHighHz)}
          usual={usualValues(
            [20_000, 22_000, 40_000].filter((hz) => hz <= capture.sampleRateHz / 2),
            'Hz',
          )}
          {...slot('bandHighHz')}
        />
        , count harmonics up to{' '}
        <NumberSlot
          label="Highest harmonic"
          unit=""
          text={String(method.highestHarmonic)}
          usual={usualValues([5, 10, 20], '')}
          {...slot('highestHarmonic')}
        />
        .
      </Sentence>
      {Object.values(wrong).map((words) => (
        <FormError key={words}>{words}</FormError>
      ))}
      <p className="bl-capture-keep">
        <Button
          {...(isChanged ? {} : { variant: 'surface' as const, color: 'gray' as const, highContrast: true })}
          disabled={Object.keys(wrong).length > 0 || analyse.isPending}
          onClick={() => analyse.mutate(toRequest(method, capture))}
        >
          Analyse again
        </Button>
        {isChanged && (
          <button type="button" className="bl-word" onClick={() => setMethod(shown)}>
            Put the words back
          </button>
        )}
      </p>
      {analyse.error && <FormError>{errorWords(analyse.error)}</FormError>}
      <p role="status" className="bl-small">
        {analyse.data &&
          (analyse.data.isNew
            ? 'Asked for: the new record will stand here when it is done, and this one stays.'
            : 'Nothing new: this was analysed with these words and this version before.')}
      </p>
    </>
  );
}

function measureOptions(shown: Method['measure']) {
  const choices: readonly Method['measure'][] = MEASURE_CHOICES;
  const measures = choices.includes(shown) ? choices : [shown, ...choices];
  return measures.map((measure) => ({ value: measure, label: measureTitle(measure) }));
}

/** Says that another analysis is under way, and lets it be stopped. */
export function RunningWords({ capture }: { capture: Capture }) {
  const cancel = useCancelAnalysis();
  const { jobId } = capture;
  if (capture.state !== 'queued' && capture.state !== 'analysing') return null;
  return (
    <p className="bl-capture-keep" role="status">
      An analysis{' '}
      {capture.state === 'queued' ? STATE_WORDS.queued.replace('waits', 'is waiting') : 'is running'}
      {capture.state === 'analysing' &&
        capture.progress !== null &&
        `, ${formatPercent(capture.progress)}`}.{' '}
      {jobId !== null && (
        <button
          type="button"
          className="bl-word"
          disabled={cancel.isPending}
          onClick={() => cancel.mutate(jobId)}
        >
          Stop it
        </button>
      )}
    </p>
  );
}
