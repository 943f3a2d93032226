import { TextField } from '@radix-ui/themes';
import type { Ref } from 'react';
import { KeyCap } from '../key-cap';

export interface FindFieldProps {
  onFind: (words: string) => void;
  ref?: Ref<HTMLInputElement>;
}

/** Find: Enter looks the words up in the archive. */
export function FindField({ onFind, ref }: FindFieldProps) {
  return (
    <form
      role="search"
      onSubmit={(event) => {
        event.preventDefault();
        const words = new FormData(event.currentTarget).get('words');
        if (typeof words === 'string') onFind(words.trim());
      }}
    >
      <TextField.Root
        ref={ref}
        name="words"
        type="search"
        size="2"
        placeholder="Find"
        aria-label="Find in the archive"
        aria-keyshortcuts="/"
        autoComplete="off"
      >
        <TextField.Slot side="right" aria-hidden="true">
          <KeyCap>/</KeyCap>
        </TextField.Slot>
      </TextField.Root>
    </form>
  );
}
