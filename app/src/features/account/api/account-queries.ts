import { queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';

export const accountQueries = {
  all: () => ['account'] as const,
  sessions: () =>
    queryOptions({
      queryKey: [...accountQueries.all(), 'sessions'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/me/sessions', { signal })),
    }),
  tokens: () =>
    queryOptions({
      queryKey: [...accountQueries.all(), 'tokens'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/me/tokens', { signal })),
    }),
};
