/**
 * Where to go after signing in. Only a path of this site is taken: a `next` that leads elsewhere would send a person
 * who has just signed in to somebody else's page.
 *
 * @returns a path with its search and hash; `/` when `next` is missing or leads away
 */
export function nextPath(next: string | null, origin: string = location.origin): string {
  if (next === null || !next.startsWith('/')) return '/';
  try {
    // The browser's own reading decides: "/\\elsewhere" and "//elsewhere" are addresses of another host to it.
    const url = new URL(next, origin);
    if (url.origin !== origin || url.pathname.startsWith('/sign-in')) return '/';
    return url.pathname + url.search + url.hash;
  } catch {
    return '/'; // not an address at all
  }
}
