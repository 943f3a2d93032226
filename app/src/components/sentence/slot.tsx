import { DropdownMenu, Popover } from '@radix-ui/themes';
import { type ButtonHTMLAttributes, type ReactNode, type Ref, useState } from 'react';
import './sentence.css';

/** The method sentence: settings that are read, and changed word by word. */
export function Sentence({ children }: { children: ReactNode }) {
  return <p className="bl-sentence">{children}</p>;
}

interface SlotButtonProps extends ButtonHTMLAttributes<HTMLButtonElement> {
  label: string;
  text: string;
  isChanged?: boolean;
  ref?: Ref<HTMLButtonElement>;
}

function SlotButton({ label, text, isChanged = false, ...rest }: SlotButtonProps) {
  return (
    <button
      type="button"
      className={isChanged ? 'bl-slot bl-slot-changed' : 'bl-slot'}
      aria-label={`${label}, ${text}`}
      {...rest}
    >
      {text}
      <svg width="9" height="6" viewBox="0 0 9 6" aria-hidden="true">
        <path d="M1 1l3.5 3.5L8 1" fill="none" stroke="currentColor" strokeWidth="1.3" />
      </svg>
    </button>
  );
}

export interface SlotOption<Value extends string> {
  value: Value;
  label: string;
  /** A few words at the right: when one takes it. */
  detail?: string;
}

export interface SlotSelectProps<Value extends string> {
  /** What the slot sets: "Unit". Its accessible name is "Unit, any unit". */
  label: string;
  value: Value;
  options: readonly SlotOption<Value>[];
  onChange: (value: Value) => void;
  /** Marked where it differs from what it is compared with. */
  isChanged?: boolean;
  isDisabled?: boolean;
}

/** A word of the sentence that is chosen from a few. */
export function SlotSelect<Value extends string>({
  label,
  value,
  options,
  onChange,
  isChanged,
  isDisabled,
}: SlotSelectProps<Value>) {
  const text = options.find((option) => option.value === value)?.label ?? value;
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger disabled={isDisabled}>
        <SlotButton label={label} text={text} isChanged={isChanged} />
      </DropdownMenu.Trigger>
      <DropdownMenu.Content aria-label={label} align="start" className="bl-slot-menu">
        <DropdownMenu.RadioGroup
          value={value}
          onValueChange={(next) => {
            const chosen = options.find((option) => option.value === next);
            if (chosen) onChange(chosen.value);
          }}
        >
          {options.map((option) => (
            <DropdownMenu.RadioItem key={option.value} value={option.value}>
              <span className="bl-slot-option">
                {option.label}
                {option.detail && <span className="bl-slot-detail">{option.detail}</span>}
              </span>
            </DropdownMenu.RadioItem>
          ))}
        </DropdownMenu.RadioGroup>
      </DropdownMenu.Content>
    </DropdownMenu.Root>
  );
}

export interface SlotPopoverProps {
  label: string;
  text: string;
  isChanged?: boolean;
  /** The field and the usual values; call `close` when one is taken. */
  children: (close: () => void) => ReactNode;
}

/** A word of the sentence that opens a small form. */
export function SlotPopover({ label, text, isChanged, children }: SlotPopoverProps) {
  const [isOpen, setIsOpen] = useState(false);
  return (
    <Popover.Root open={isOpen} onOpenChange={setIsOpen}>
      <Popover.Trigger>
        <SlotButton label={label} text={text} isChanged={isChanged} />
      </Popover.Trigger>
      <Popover.Content aria-label={label} align="start" maxWidth="340px">
        {children(() => setIsOpen(false))}
      </Popover.Content>
    </Popover.Root>
  );
}

/** A word of a record's method: read only, marked where it differs. */
export function SlotText({ children, isChanged = false }: { children: ReactNode; isChanged?: boolean }) {
  return <span className={isChanged ? 'bl-slot-read bl-slot-changed' : 'bl-slot-read'}>{children}</span>;
}
