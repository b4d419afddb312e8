import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { layoutEndpoints, type Layout } from '@/shared/layouts.ts';
import { apiCall } from './call.ts';
import { layoutsRoot as root } from './roots.ts';

export const layoutsQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(layoutEndpoints.list, { signal })).items,
  });

export const layoutQuery = (layoutId: string) =>
  queryOptions({
    queryKey: [...root, 'one', layoutId],
    queryFn: ({ signal }) => apiCall(layoutEndpoints.get, { params: { layoutId }, signal }),
  });

async function settle(client: QueryClient, layout: Layout): Promise<void> {
  client.setQueryData(layoutQuery(layout.id).queryKey, layout);
  await client.invalidateQueries({ queryKey: root });
}

export function useLayoutAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof layoutEndpoints.add>) => apiCall(layoutEndpoints.add, { body }),
    onSuccess: (layout) => settle(client, layout),
  });
}

export function useLayoutChange() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({
      layoutId,
      version,
      body,
    }: {
      layoutId: string;
      version: number;
      body: BodyOf<typeof layoutEndpoints.change>;
    }) => apiCall(layoutEndpoints.change, { params: { layoutId }, body, version }),
    onSuccess: (layout) => settle(client, layout),
  });
}
