import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { api, unwrap } from '@/lib/api-client';

/** A small bench's whole shelf: menus that offer units hold no more than this. */
const UNITS_IN_A_MENU = 200;

export const unitQueries = {
  all: () => ['units'] as const,
  list: (q: string) =>
    queryOptions({
      queryKey: [...unitQueries.all(), 'list', q] as const,
      queryFn: ({ signal }) =>
        unwrap(
          api.GET('/api/units', {
            params: { query: { limit: UNITS_IN_A_MENU, ...(q ? { q } : {}) } },
            signal,
          }),
        ),
      placeholderData: keepPreviousData,
    }),
  detail: (unitId: string) =>
    queryOptions({
      queryKey: [...unitQueries.all(), 'detail', unitId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/units/{id}', { params: { path: { id: unitId } }, signal })),
    }),
};

export const rigQueries = {
  all: () => ['rigs'] as const,
  list: () =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'list'] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/rigs', { signal })),
    }),
  detail: (rigId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'detail', rigId] as const,
      queryFn: ({ signal }) => unwrap(api.GET('/api/rigs/{id}', { params: { path: { id: rigId } }, signal })),
    }),
  calibrations: (rigId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'calibrations', rigId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/rigs/{id}/calibrations', { params: { path: { id: rigId } }, signal })),
    }),
  /** What the Live page may use of a rig today. */
  liveSettings: (rigId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'live-settings', rigId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/rigs/{id}/live-settings', { params: { path: { id: rigId } }, signal })),
    }),
  baselines: (rigId: string) =>
    queryOptions({
      queryKey: [...rigQueries.all(), 'baselines', rigId] as const,
      queryFn: ({ signal }) =>
        unwrap(api.GET('/api/rigs/{id}/baselines', { params: { path: { id: rigId } }, signal })),
    }),
};
