import { infiniteQueryOptions, keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';
import type { CaptureListQuery } from '@/lib/api-schema';

export const CAPTURES_PER_PAGE = 50;

export const captureQueries = {
  all: () => ['captures'] as const,
  lists: () => [...captureQueries.all(), 'list'] as const,
  list: (filter: CaptureListQuery) =>
    infiniteQueryOptions({
      queryKey: [...captureQueries.lists(), filter] as const,
      queryFn: ({ signal, pageParam }) =>
        unwrap(
          api.GET('/api/captures', {
            params: {
              query: { limit: CAPTURES_PER_PAGE, ...filter, ...(pageParam ? { cursor: pageParam } : {}) },
            },
            signal,
          }),
        ),
      initialPageParam: null as string | null,
      getNextPageParam: (page) => page.nextCursor,
      placeholderData: keepPreviousData,
    }),
  /** A few, for a short list elsewhere than in the archive. */
  some: (filter: CaptureListQuery) =>
    queryOptions({
      queryKey: [...captureQueries.lists(), 'some', filter] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/captures', { params: { query: filter }, signal })),
    }),
  detail: (captureId: string) =>
    queryOptions({
      queryKey: [...captureQueries.all(), 'detail', captureId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/captures/{id}', { params: { path: { id: captureId } }, signal })),
    }),
  overview: (captureId: string) =>
    queryOptions({
      queryKey: [...captureQueries.all(), 'overview', captureId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/captures/{id}/overview', { params: { path: { id: captureId } }, signal })),
      staleTime: Infinity, // the bytes of a capture never change
    }),
  records: (captureId: string) =>
    queryOptions({
      queryKey: [...captureQueries.all(), 'records', captureId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/captures/{id}/records', { params: { path: { id: captureId } }, signal })),
    }),
};
