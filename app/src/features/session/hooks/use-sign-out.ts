import { useMutation, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { api, unwrap } from '@/lib/api-client';
import { forgetCsrfToken } from '@/lib/csrf';
import { sessionQueries } from '@/lib/queries/session';

/** Ends the session on the server and empties this page of what it had fetched. */
export function useSignOut() {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  return useMutation({
    mutationFn: () => unwrap(api.DELETE('/api/session')),
    onSuccess: async () => {
      forgetCsrfToken();
      await navigate('/sign-in', { replace: true, state: { hasSignedOut: true } });
      queryClient.clear();
      await queryClient.query(sessionQueries.current());
    },
  });
}
