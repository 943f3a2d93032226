import { queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';

export const todayQueries = {
  today: () =>
    queryOptions({
      queryKey: ['today'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/today', { signal })),
    }),
};
