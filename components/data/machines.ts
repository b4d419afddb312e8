import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { machineEndpoints, type Machine } from '@/shared/machines.ts';
import { apiCall } from './call.ts';

const root = ['machines'] as const;

export const machinesQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(machineEndpoints.list, { signal })).items,
  });

export const machineQuery = (machineId: string) =>
  queryOptions({
    queryKey: [...root, 'one', machineId],
    queryFn: ({ signal }) => apiCall(machineEndpoints.get, { params: { machineId }, signal }),
  });

function settle(client: QueryClient, machine: Machine): Promise<void> {
  client.setQueryData(machineQuery(machine.id).queryKey, machine);
  return client.invalidateQueries({ queryKey: root });
}

export function useMachineAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof machineEndpoints.add>) => apiCall(machineEndpoints.add, { body }),
    onSuccess: (machine) => settle(client, machine),
  });
}

export function useMachineRevise() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: { machineId: string; version: number; body: BodyOf<typeof machineEndpoints.revise> }) =>
      apiCall(machineEndpoints.revise, {
        params: { machineId: given.machineId },
        body: given.body,
        version: given.version,
      }),
    onSuccess: (machine) => settle(client, machine),
  });
}
