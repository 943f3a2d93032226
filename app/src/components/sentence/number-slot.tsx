import { Button } from '@radix-ui/themes';
import { useState } from 'react';
import { TextInput } from '@/components/forms/field';
import { SlotPopover } from './slot';
import { withUnit } from '@/lib/format/quantity';

export interface NumberSlotProps {
  label: string;
  /** As it stands in the sentence. */
  text: string;
  value: number;
  unit: string;
  usual: readonly { value: number; text: string }[];
  error?: string;
  isChanged: boolean;
  onChange: (value: number) => void;
}

/** A number in a sentence: opens a field and a few usual values. */
export function NumberSlot({ label, text, value, unit, usual, error, isChanged, onChange }: NumberSlotProps) {
  return (
    <SlotPopover label={label} text={text} isChanged={isChanged}>
      {(close) => (
        <NumberForm
          label={unit === '' ? label : `${label}, ${unit}`}
          value={value}
          error={error}
          onTake={(next) => {
            onChange(next);
            close();
          }}
        >
          <ul className="bl-slot-usual">
            {usual.map((option) => (
              <li key={option.value}>
                <button
                  type="button"
                  className="bl-word"
                  onClick={() => {
                    onChange(option.value);
                    close();
                  }}
                >
                  {option.text}
                </button>
              </li>
            ))}
          </ul>
        </NumberForm>
      )}
    </SlotPopover>
  );
}

interface NumberFormProps {
  label: string;
  value: number;
  error: string | undefined;
  children: React.ReactNode;
  onTake: (value: number) => void;
}

function NumberForm({ label, value, error, children, onTake }: NumberFormProps) {
  const [typed, setTyped] = useState(String(Number(value.toFixed(4))));
  const number = Number(typed.replace(',', '.'));
  const isNumber = typed.trim() !== '' && Number.isFinite(number);
  return (
    <form
      noValidate
      onSubmit={(event) => {
        event.preventDefault();
        event.stopPropagation();
        if (isNumber) onTake(number);
      }}
    >
      <TextInput
        label={label}
        inputMode="decimal"
        autoFocus
        value={typed}
        error={isNumber ? error : 'This is not a number.'}
        onChange={({ target }) => setTyped(target.value)}
      />
      {children}
      <Button type="submit" variant="surface" color="gray" highContrast disabled={!isNumber}>
        Take it
      </Button>
    </form>
  );
}

/** Usual values of one unit, written out. */
export function usualValues(values: readonly number[], unit: string): { value: number; text: string }[] {
  return values.map((value) => ({ value, text: withUnit(String(value), unit) }));
}
