import { queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { Session } from '@/lib/api-schema';
import { rememberCsrfToken } from '@/lib/csrf';

/** Every session that arrives brings the token for writing with it. */
export function takeSession(session: Session): Session {
  rememberCsrfToken(session.csrfToken);
  return session;
}

export const sessionQueries = {
  current: () =>
    queryOptions({
      queryKey: ['session'] as const,
      queryFn: async ({ signal }) => takeSession(await unwrap(api.GET('/api/session', { signal }))),
      staleTime: Infinity,
    }),
};
