import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { requestEndpoints } from '@/shared/cards.ts';
import { apiCall } from './call.ts';
import { cardsRoot } from './roots.ts';

const root = ['requests'] as const;

/** Plates that had no approved strategy. */
export const requestsQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(requestEndpoints.list, { signal })).items,
  });

export function useRequestAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof requestEndpoints.add>) => apiCall(requestEndpoints.add, { body }),
    onSuccess: async () => {
      await Promise.all([root, cardsRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
    },
  });
}
