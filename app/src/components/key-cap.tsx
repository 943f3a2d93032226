/** A key of the keyboard, as it is printed on a button or in a sentence. */
export function KeyCap({ children }: { children: string }) {
  return <kbd className="bl-key">{children}</kbd>;
}
