import { keepPreviousData, queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { plateEndpoints, type Plate } from '@/shared/plates.ts';
import { apiCall } from './call.ts';
import { cardsRoot } from './roots.ts';

const root = ['plates'] as const;

/** Plates in the yard; those whose tag holds `tag` when one is given. What was listed stays while the next is fetched. */
export const platesQuery = (tag = '') =>
  queryOptions({
    queryKey: [...root, 'list', tag],
    queryFn: async ({ signal }) =>
      (await apiCall(plateEndpoints.list, { query: tag === '' ? {} : { tag }, signal })).items,
    placeholderData: keepPreviousData,
  });

export const plateQuery = (plateId: string) =>
  queryOptions({
    queryKey: [...root, 'one', plateId],
    queryFn: ({ signal }) => apiCall(plateEndpoints.get, { params: { plateId }, signal }),
  });

async function settle(client: QueryClient, plate: Plate): Promise<void> {
  client.setQueryData(plateQuery(plate.id).queryKey, plate);
  await Promise.all([root, cardsRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
}

export function usePlateAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof plateEndpoints.add>) => apiCall(plateEndpoints.add, { body }),
    onSuccess: (plate) => settle(client, plate),
  });
}

export function usePlateChange() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: { plateId: string; version: number; body: BodyOf<typeof plateEndpoints.change> }) =>
      apiCall(plateEndpoints.change, {
        params: { plateId: given.plateId },
        body: given.body,
        version: given.version,
      }),
    onSuccess: (plate) => settle(client, plate),
  });
}
