import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { recordEndpoints } from '@/shared/record.ts';
import { apiCall } from './call.ts';

const root = ['record'] as const;

/** Who decided what, newest first, page by page. */
export const recordQuery = () =>
  infiniteQueryOptions({
    queryKey: [...root, 'list'],
    initialPageParam: null as number | null, // widened: later pages begin at a sequence number
    queryFn: async ({ pageParam, signal }) =>
      (await apiCall(recordEndpoints.list, { query: pageParam === null ? {} : { before: pageParam }, signal })).items,
    getNextPageParam: (page) => {
      const last = page[page.length - 1];
      return last === undefined || last.sequence <= 1 ? null : last.sequence;
    },
  });

/** The hash chain recomputed by the server; asked for by a person only. */
export const recordCheckQuery = () =>
  queryOptions({
    queryKey: [...root, 'check'],
    queryFn: ({ signal }) => apiCall(recordEndpoints.verify, { signal }),
    enabled: false,
    gcTime: 0,
  });
