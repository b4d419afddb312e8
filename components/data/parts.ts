import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { partEndpoints, type DrawingAnswers } from '@/shared/parts.ts';
import { apiAddress, apiCall } from './call.ts';
import { partsRoot as root } from './roots.ts';

export const partsQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(partEndpoints.list, { signal })).items,
  });

export const partQuery = (partId: string) =>
  queryOptions({
    queryKey: [...root, 'one', partId],
    queryFn: ({ signal }) => apiCall(partEndpoints.get, { params: { partId }, signal }),
  });

/** Where the drawing lies as it came, for a download. */
export const partFileAddress = (partId: string): string => apiAddress(partEndpoints.file, { params: { partId } });

/** Reads a drawing without keeping it: what it holds, and what must be asked. */
export function useDrawingRead() {
  return useMutation({
    mutationFn: ({ file, answers }: { file: File; answers: DrawingAnswers }) =>
      apiCall(partEndpoints.read, { body: answers, file }),
  });
}

export function usePartAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ file, body }: { file: File; body: BodyOf<typeof partEndpoints.add> }) =>
      apiCall(partEndpoints.add, { body, file }),
    onSuccess: (part) => {
      client.setQueryData(partQuery(part.id).queryKey, part);
      return client.invalidateQueries({ queryKey: root });
    },
  });
}
