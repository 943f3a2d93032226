import { TextArea, TextField } from '@radix-ui/themes';
import { type ComponentProps, type ReactNode, useId, useState } from 'react';
import './forms.css';

interface FieldFrame {
  label: string;
  /** Below, 13 px: what is meant, in which unit. */
  help?: ReactNode;
  /** What is wrong and what may be meant; takes the help's place. */
  error?: string | null;
}

interface FieldControl {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
}

/** Label above, help or error below; the control is given the ids that tie them. */
export function Field({
  label,
  help,
  error,
  children,
}: FieldFrame & { children: (control: FieldControl) => ReactNode }) {
  const id = useId();
  const noteId = `${id}-note`;
  return (
    <div className={error ? 'bl-field bl-field-wrong' : 'bl-field'}>
      <label htmlFor={id}>{label}</label>
      {children({
        id,
        'aria-describedby': error || help ? noteId : undefined,
        'aria-invalid': error ? true : undefined,
      })}
      {error ? (
        <p id={noteId} className="bl-field-error" role="alert">
          {error}
        </p>
      ) : (
        help && (
          <p id={noteId} className="bl-field-help">
            {help}
          </p>
        )
      )}
    </div>
  );
}

export type TextInputProps = FieldFrame & Omit<ComponentProps<typeof TextField.Root>, 'id' | 'children'>;

/** One line of text; passes everything else (react-hook-form's register too) to the input. */
export function TextInput({ label, help, error, ...input }: TextInputProps) {
  return (
    <Field label={label} help={help} error={error}>
      {(control) => <TextField.Root size="2" {...input} {...control} />}
    </Field>
  );
}

/** A password that can be shown. */
export function PasswordInput({ label, help, error, ...input }: Omit<TextInputProps, 'type'>) {
  const [isShown, setIsShown] = useState(false);
  return (
    <Field label={label} help={help} error={error}>
      {(control) => (
        <TextField.Root size="2" {...input} {...control} type={isShown ? 'text' : 'password'}>
          <TextField.Slot side="right">
            <button
              type="button"
              className="bl-word"
              aria-label={`${isShown ? 'Hide' : 'Show'} ${label.toLowerCase()}`}
              onClick={() => setIsShown(!isShown)}
            >
              {isShown ? 'Hide' : 'Show'}
            </button>
          </TextField.Slot>
        </TextField.Root>
      )}
    </Field>
  );
}

export type TextAreaInputProps = FieldFrame & Omit<ComponentProps<typeof TextArea>, 'id'>;

export function TextAreaInput({ label, help, error, ...input }: TextAreaInputProps) {
  return (
    <Field label={label} help={help} error={error}>
      {(control) => <TextArea size="2" {...input} {...control} />}
    </Field>
  );
}

export interface SelectOption {
  value: string;
  label: string;
}

export type SelectInputProps = FieldFrame &
  Omit<ComponentProps<'select'>, 'id'> & { options: readonly SelectOption[] };

/** The browser's own list: it works with every keyboard, phone and form library. */
export function SelectInput({ label, help, error, options, ...input }: SelectInputProps) {
  return (
    <Field label={label} help={help} error={error}>
      {(control) => (
        <select className="bl-select" {...input} {...control}>
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </Field>
  );
}

export type CheckboxInputProps = Omit<ComponentProps<'input'>, 'id' | 'type'> & { label: ReactNode };

/** A box to tick, with its words. */
export function CheckboxInput({ label, ...input }: CheckboxInputProps) {
  return (
    <label className="bl-checkbox">
      <input type="checkbox" {...input} />
      <span>{label}</span>
    </label>
  );
}

/** What the server refused about the form as a whole. */
export function FormError({ children }: { children: ReactNode }) {
  return (
    <p className="bl-form-error" role="alert">
      {children}
    </p>
  );
}
