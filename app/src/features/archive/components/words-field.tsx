import { useEffect, useEffectEvent, useState } from 'react';
import { TextInput } from '@/components/forms/field';

/** Long enough that a word is asked for and not each of its letters. */
const TYPING_PAUSE_MS = 300;

export interface WordsFieldProps {
  words: string;
  onChange: (words: string) => void;
}

/** Words to look for. The list follows once the typing pauses. */
export function WordsField({ words, onChange }: WordsFieldProps) {
  const [typed, setTyped] = useState(words);
  const [known, setKnown] = useState(words);
  if (known !== words) {
    // Changed from elsewhere (Find, a link, the way back): the field follows unless it asked for it itself.
    setKnown(words);
    if (typed.trim() !== words) setTyped(words);
  }
  const send = useEffectEvent(onChange);
  useEffect(() => {
    if (typed.trim() === words) return;
    const timer = setTimeout(() => send(typed.trim()), TYPING_PAUSE_MS);
    return () => clearTimeout(timer);
  }, [typed, words]);
  return (
    <TextInput
      label="Words"
      type="search"
      placeholder="unit, file, note, hash"
      value={typed}
      onChange={(event) => setTyped(event.target.value)}
    />
  );
}
