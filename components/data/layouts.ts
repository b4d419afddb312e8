import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { layoutEndpoints, type Layout } from '@/shared/layouts.ts';
import { apiCall } from './call.ts';
import { cornerPlansRoot, layoutsRoot as root } from './roots.ts';

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
  // a plan says which version of its layout is the newest
  await Promise.all([root, cornerPlansRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
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
