type Listener = () => void;

const listeners = new Set<Listener>();

/** Called when the server says that nobody is signed in (any more). Returns the way to stop listening. */
export function onSignedOut(listener: Listener): () => void {
  listeners.add(listener);
  return () => {
    listeners.delete(listener);
  };
}

export function announceSignedOut(): void {
  for (const listener of listeners) listener();
}
