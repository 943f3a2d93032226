import { AlertDialog } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type { Person, Session } from '@/lib/api-schema';
import { sessionQueries, takeSession } from '@/lib/queries/session';
import { onSignedOut } from '@/lib/session-events';
import { SignInForm } from './sign-in-form';

/**
 * When the session ends while somebody works, the page stays as it is, with all that was typed, under a dialog that
 * signs the same person in again.
 */
export function SessionEnded({ person, demo }: { person: Person; demo: Session['demo'] }) {
  const queryClient = useQueryClient();
  const [hasEnded, setHasEnded] = useState(false);
  useEffect(() => onSignedOut(() => setHasEnded(true)), []);

  const takeUp = (session: Session) => {
    const isSamePerson = session.person?.id === person.id;
    if (!isSamePerson) {
      // Another person must not find the first one's page: everything is fetched anew.
      location.assign('/');
      return;
    }
    queryClient.setQueryData(sessionQueries.current().queryKey, takeSession(session));
    setHasEnded(false);
    void queryClient.invalidateQueries({ predicate: ({ queryKey }) => queryKey[0] !== 'session' });
  };
  return (
    <AlertDialog.Root open={hasEnded}>
      <AlertDialog.Content maxWidth="440px" onEscapeKeyDown={(event) => event.preventDefault()}>
        <AlertDialog.Title size="4">Your session has ended</AlertDialog.Title>
        <AlertDialog.Description size="2" mb="4">
          Sign in again and go on: the page and what you typed are still there.
        </AlertDialog.Description>
        <SignInForm demo={demo} email={person.email} onSignedIn={takeUp} />
      </AlertDialog.Content>
    </AlertDialog.Root>
  );
}
