/** Somewhere the rail leads to; only what exists is listed. */
export interface Place {
  to: string;
  label: string;
  /** After g: the key that goes there. */
  goKey: string;
  /** Who sees it; anyone signed in when left out. */
  roles?: readonly string[];
}

export const PLACES: readonly Place[] = [
  { to: '/', label: 'Today', goKey: 't' },
  { to: '/live', label: 'Live', goKey: 'l', roles: ['technician', 'reviewer', 'administrator'] },
  { to: '/archive', label: 'Archive', goKey: 'a', roles: ['technician', 'reviewer', 'administrator'] },
  { to: '/units', label: 'Units', goKey: 'u', roles: ['technician', 'reviewer', 'administrator'] },
  { to: '/rigs', label: 'Rigs', goKey: 'r', roles: ['technician', 'reviewer', 'administrator'] },
  { to: '/stimuli', label: 'Stimuli', goKey: 's', roles: ['technician', 'reviewer', 'administrator'] },
  { to: '/people', label: 'People and audit', goKey: 'p', roles: ['administrator'] },
];

export function placesFor(roles: readonly string[]): readonly Place[] {
  return PLACES.filter((place) => !place.roles || place.roles.some((role) => roles.includes(role)));
}

/** The place a path belongs to: the longest prefix; captures and records belong to the archive. */
export function placeOf(pathname: string, places: readonly Place[]): Place | undefined {
  const path = /^\/(captures|records)(\/|$)/.test(pathname) ? '/archive' : pathname;
  return places
    .filter(({ to }) => (to === '/' ? path === '/' : path === to || path.startsWith(`${to}/`)))
    .sort((a, b) => b.to.length - a.to.length)[0];
}
