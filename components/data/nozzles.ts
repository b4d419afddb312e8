import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { nozzleEndpoints } from '@/shared/machines.ts';
import { apiCall } from './call.ts';

const root = ['nozzles'] as const;

export const nozzlesQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(nozzleEndpoints.list, { signal })).items,
  });

export function useNozzleAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof nozzleEndpoints.add>) => apiCall(nozzleEndpoints.add, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: root }),
  });
}
