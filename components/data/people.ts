import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { peopleEndpoints, type Member } from '@/shared/people.ts';
import { apiCall } from './call.ts';

const root = ['people'] as const;

export const peopleQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(peopleEndpoints.list, { signal })).items,
  });

export function usePersonAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof peopleEndpoints.add>) => apiCall(peopleEndpoints.add, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: root }),
  });
}

export function usePersonChange() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (given: { member: Pick<Member, 'id' | 'version'>; change: BodyOf<typeof peopleEndpoints.change> }) =>
      apiCall(peopleEndpoints.change, {
        params: { memberId: given.member.id },
        body: given.change,
        version: given.member.version,
      }),
    onSuccess: () => client.invalidateQueries({ queryKey: root }),
  });
}
