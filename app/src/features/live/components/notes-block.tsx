import { Button } from '@radix-ui/themes';
import { useState, type RefObject } from 'react';
import { TextInput } from '@/components/forms/field';
import { MarginBlock } from '@/components/page/page';
import { formatDuration } from '@/lib/format/quantity';
import { useLive, useLiveBench } from '../hooks/live-bench-context';

/** Notes with the moment they were made at; they go with the next take that is put away. */
export function NotesBlock({ fieldRef }: { fieldRef: RefObject<HTMLInputElement | null> }) {
  const bench = useLiveBench();
  const notes = useLive((state) => state.notes);
  const [text, setText] = useState('');
  return (
    <MarginBlock title="Notes">
      {notes.length > 0 && (
        <ul className="bl-live-notes">
          {notes.map(({ atS, text: words }, index) => (
            <li key={index}>
              <span className="bl-ink-2">{formatDuration(atS)}</span> {words}
            </li>
          ))}
        </ul>
      )}
      <form
        noValidate
        onSubmit={(event) => {
          event.preventDefault();
          const words = text.trim();
          if (words === '') return;
          bench.addNote(words);
          setText('');
        }}
      >
        <TextInput
          ref={fieldRef}
          label="A note to go with the take"
          maxLength={1000}
          value={text}
          onChange={({ target }) => setText(target.value)}
        />
        <Button type="submit" variant="surface" color="gray" highContrast disabled={text.trim() === ''}>
          Note it
        </Button>
      </form>
    </MarginBlock>
  );
}
