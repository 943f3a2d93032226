import { useEffect, useRef } from 'react';

export interface LiveKeys {
  onPlay: () => void;
  onStop: () => void;
  onHold: () => void;
  onKeep: () => void;
  onNote: () => void;
}

function isTyping(target: EventTarget | null): boolean {
  return (
    target instanceof HTMLElement &&
    (['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName) ||
      target.closest('[role="dialog"], [role="alertdialog"], [role="menu"]') !== null)
  );
}

/** A focused button has the space bar for itself; a word of the sentence opens by Enter too, and leaves it to Play. */
function isOnButton(target: EventTarget | null): boolean {
  return target instanceof HTMLElement && target.closest('button:not(.bl-slot), a, summary, label') !== null;
}

/** For a hand on a screwdriver: Space plays, Esc stops from anywhere, H holds, K keeps, M makes a note. */
export function useLiveKeys(keys: LiveKeys): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      // Even out of a dialog or a field, and whatever else Esc does there.
      if (event.key === 'Escape') latest.current.onStop();
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target))
        return;
      const key = event.key.toLowerCase();
      if (key === ' ' && !isOnButton(event.target)) latest.current.onPlay();
      else if (key === 'h') latest.current.onHold();
      else if (key === 'k') latest.current.onKeep();
      else if (key === 'm') latest.current.onNote();
      else return;
      event.preventDefault();
      event.stopPropagation();
    };
    // Before dialogs see it: they keep Esc for themselves.
    document.addEventListener('keydown', onKeyDown, { capture: true });
    return () => document.removeEventListener('keydown', onKeyDown, { capture: true });
  }, []);
}
