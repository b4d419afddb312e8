import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { gradeEndpoints } from '@/shared/machines.ts';
import { apiCall } from './call.ts';

const root = ['grades'] as const;

export const gradesQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(gradeEndpoints.list, { signal })).items,
  });

export function useGradeAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof gradeEndpoints.add>) => apiCall(gradeEndpoints.add, { body }),
    onSuccess: () => client.invalidateQueries({ queryKey: root }),
  });
}
