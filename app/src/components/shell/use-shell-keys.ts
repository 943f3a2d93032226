import { useEffect, useRef } from 'react';

/** How long g waits for its letter. */
const GO_WAIT_MS = 1200;

export interface ShellKeys {
  onFind: () => void;
  onAddRecordings: () => void;
  onHelp: () => void;
  /** A letter after g; tells whether it meant something. */
  onGo: (letter: string) => boolean;
}

/** Keys act on the page, never while somebody types or a dialog is open. */
function isTyping(target: EventTarget | null): boolean {
  if (!(target instanceof HTMLElement)) return false;
  if (target.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName)) return true;
  return target.closest('[role="dialog"], [role="alertdialog"], [role="menu"], [role="listbox"]') !== null;
}

/** / finds, U adds recordings, ? lists the keys, g then a letter goes. */
export function useShellKeys(keys: ShellKeys): void {
  const latest = useRef(keys);
  useEffect(() => {
    latest.current = keys;
  });
  useEffect(() => {
    let goAskedAtMs = -Infinity;
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey || isTyping(event.target))
        return;
      const key = event.key.toLowerCase();
      if (event.timeStamp - goAskedAtMs < GO_WAIT_MS) {
        goAskedAtMs = -Infinity;
        if (latest.current.onGo(key)) event.preventDefault();
        return;
      }
      if (key === 'g') goAskedAtMs = event.timeStamp;
      else if (key === '/') latest.current.onFind();
      else if (key === 'u') latest.current.onAddRecordings();
      else if (key === '?') latest.current.onHelp();
      else return;
      event.preventDefault();
    };
    document.addEventListener('keydown', onKeyDown);
    return () => document.removeEventListener('keydown', onKeyDown);
  }, []);
}
