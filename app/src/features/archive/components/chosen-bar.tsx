import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { FilingSlots } from '@/components/filing/filing-slots';
import type { FilingValue } from '@/components/filing/filing-slots';
import { FormError } from '@/components/forms/field';
import { Sentence } from '@/components/sentence/slot';
import type { Capture, Rig, Unit } from '@/lib/api-schema';
import { errorWords } from '@/lib/error-words';
import { useFileCaptures } from '../hooks/use-file-captures';

export interface ChosenBarProps {
  captures: readonly Capture[];
  units: readonly Unit[];
  rigs: readonly Rig[];
  onLetGo: () => void;
}

/** What can be done with the chosen rows: file them all at one place. */
export function ChosenBar({ captures, units, rigs, onLetGo }: ChosenBarProps) {
  const [filing, setFiling] = useState<FilingValue>(() => filingOf(captures[0]));
  const file = useFileCaptures(onLetGo);
  const numbers = captures.map(({ number }) => number).sort((a, b) => a - b);
  return (
    <section className="bl-chosen-bar" aria-label="Chosen captures">
      <div>
        <p>
          <strong>{captures.length} chosen</strong> <span className="bl-ink-2">{listWords(numbers)}</span>
        </p>
        <Sentence>
          File under <FilingSlots units={units} rigs={rigs} value={filing} onChange={setFiling} />.
        </Sentence>
        {file.error && <FormError>{errorWords(file.error)}</FormError>}
      </div>
      <div className="bl-chosen-actions">
        <Button variant="surface" color="gray" highContrast onClick={onLetGo}>
          Let go
        </Button>
        <Button disabled={file.isPending} onClick={() => file.mutate({ captures, filing })}>
          {file.isPending ? 'Filing' : 'File them there'}
        </Button>
      </div>
    </section>
  );
}

function filingOf(capture: Capture | undefined): FilingValue {
  return {
    unitId: capture?.unit?.id ?? null,
    conditionId: capture?.condition?.id ?? null,
    rigId: capture?.rig?.id ?? null,
  };
}

const MOST_NAMED = 6;

function listWords(numbers: readonly number[]): string {
  if (numbers.length <= MOST_NAMED) return numbers.join(', ');
  return `${numbers.slice(0, MOST_NAMED).join(', ')} and ${numbers.length - MOST_NAMED} more`;
}
