import { useQueryClient } from '@tanstack/react-query';
import { useCallback } from 'react';
import { useNavigate } from 'react-router-dom';
import type { Session } from '@/lib/api-schema';
import { sessionQueries, takeSession } from '@/lib/queries/session';

/** Takes a new session in and goes where the person wanted to go. */
export function useEnter(to: string): (session: Session) => void {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  return useCallback(
    (session) => {
      // What another person saw on this page before must not be shown to this one.
      queryClient.removeQueries({ predicate: ({ queryKey }) => queryKey[0] !== 'session' });
      queryClient.setQueryData(sessionQueries.current().queryKey, takeSession(session));
      void navigate(to, { replace: true });
    },
    [queryClient, navigate, to],
  );
}
