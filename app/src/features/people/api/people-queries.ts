import { infiniteQueryOptions, keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { Job } from '@/lib/api-schema';

const AUDIT_PER_PAGE = 50;
/** The queue moves by itself: looked at again after this long while its page is open. */
const JOBS_POLL_MS = 5_000;

export const peopleQueries = {
  all: () => ['people'] as const,
  list: (q: string) =>
    queryOptions({
      queryKey: [...peopleQueries.all(), 'list', q] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/people', { params: { query: q ? { q } : {} }, signal })),
      placeholderData: keepPreviousData,
    }),
  invitations: () =>
    queryOptions({
      queryKey: [...peopleQueries.all(), 'invitations'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/invitations', { signal })),
    }),
};

export const auditQueries = {
  list: (q: string) =>
    infiniteQueryOptions({
      queryKey: ['audit', q] as const,
      queryFn: ({ signal, pageParam }) =>
        unwrap(
          api.GET('/api/audit', {
            params: {
              query: {
                limit: AUDIT_PER_PAGE,
                ...(q ? { q } : {}),
                ...(pageParam ? { cursor: pageParam } : {}),
              },
            },
            signal,
          }),
        ),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
      placeholderData: keepPreviousData,
    }),
};

export const jobQueries = {
  all: () => ['jobs'] as const,
  list: (state: Job['state'] | null) =>
    queryOptions({
      queryKey: [...jobQueries.all(), state] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/jobs', { params: { query: state ? { state } : {} }, signal })),
      refetchInterval: JOBS_POLL_MS,
    }),
};

export const mailQueries = {
  list: () =>
    queryOptions({
      queryKey: ['mail'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/mail', { signal })),
    }),
};
