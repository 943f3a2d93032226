/** The part of a programme that an address asks for: 1, 2, 3 ... or null for the whole. */
export function readPart(params: URLSearchParams): number | null {
  const text = params.get('segment');
  return text !== null && /^[1-9]\d{0,3}$/.test(text) ? Number(text) : null;
}

/** The same address with another part, or the whole; an older record that was asked for stays. */
export function partSearch(params: URLSearchParams, part: number | null): string {
  const next = new URLSearchParams(params);
  if (part === null) next.delete('segment');
  else next.set('segment', String(part));
  const text = next.toString();
  return text === '' ? '' : `?${text}`;
}
