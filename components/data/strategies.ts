import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { strategyEndpoints } from '@/shared/strategies.ts';
import { apiCall } from './call.ts';
import { revisionQuery } from './revisions.ts';
import { strategiesRoot as root } from './roots.ts';

export const strategiesQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(strategyEndpoints.list, { signal })).items,
  });

export const strategyQuery = (strategyId: string) =>
  queryOptions({
    queryKey: [...root, 'one', strategyId],
    queryFn: ({ signal }) => apiCall(strategyEndpoints.get, { params: { strategyId }, signal }),
  });

export function useStrategyAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof strategyEndpoints.add>) => apiCall(strategyEndpoints.add, { body }),
    onSuccess: (strategy) => {
      client.setQueryData(strategyQuery(strategy.id).queryKey, strategy);
      for (const revision of strategy.revisions) client.setQueryData(revisionQuery(revision.id).queryKey, revision);
      return client.invalidateQueries({ queryKey: root });
    },
  });
}

/** Begins the next draft of a strategy from one of its revisions; `version` is the strategy's. */
export function useDraftBegin() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: { strategyId: string; version: number; body: BodyOf<typeof strategyEndpoints.draft> }) =>
      apiCall(strategyEndpoints.draft, {
        params: { strategyId: given.strategyId },
        body: given.body,
        version: given.version,
      }),
    onSuccess: (revision) => {
      client.setQueryData(revisionQuery(revision.id).queryKey, revision);
      return client.invalidateQueries({ queryKey: root });
    },
  });
}
