import { useQuery } from '@tanstack/react-query';
import type { Person, Role, Session } from './api-schema';
import { sessionQueries } from './queries/session';

/** The session, for what stands behind the gate that has loaded it. */
export function useSession(): Session {
  const { data } = useQuery(sessionQueries.current());
  if (!data) throw new Error('useSession is used outside the session gate');
  return data;
}

/** Who is signed in, for pages that only people who are signed in see. */
export function usePerson(): Person {
  const { person } = useSession();
  if (!person) throw new Error('usePerson is used where nobody is signed in');
  return person;
}

export function hasRole(person: Person | null, ...roles: readonly Role[]): boolean {
  return person !== null && person.roles.some((role) => roles.includes(role));
}

/** Technicians and reviewers add and file captures; an administrator only looks. */
export function canWriteCaptures(person: Person | null): boolean {
  return hasRole(person, 'technician', 'reviewer');
}

export function canReadArchive(person: Person | null): boolean {
  return hasRole(person, 'technician', 'reviewer', 'administrator');
}
