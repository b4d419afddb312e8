import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { cornerPlanEndpoints, type CornerPlan } from '@/shared/corner-plans.ts';
import type { BodyOf } from '@/shared/endpoint.ts';
import { apiCall } from './call.ts';
import { cardsRoot, cornerPlansRoot as root, layoutsRoot, partsRoot } from './roots.ts';

export const cornerPlanQuery = (planId: string) =>
  queryOptions({
    queryKey: [...root, 'one', planId],
    queryFn: ({ signal }) => apiCall(cornerPlanEndpoints.get, { params: { planId }, signal }),
  });

async function settle(client: QueryClient, plan: CornerPlan): Promise<void> {
  client.setQueryData(cornerPlanQuery(plan.id).queryKey, plan);
  await Promise.all([partsRoot, layoutsRoot, cardsRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
}

export function useCornerPlanAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof cornerPlanEndpoints.add>) => apiCall(cornerPlanEndpoints.add, { body }),
    onSuccess: (plan) => settle(client, plan),
  });
}

export function useCornerPlanRedo() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({
      plan,
      body,
    }: {
      plan: Pick<CornerPlan, 'id' | 'version'>;
      body: BodyOf<typeof cornerPlanEndpoints.redo>;
    }) => apiCall(cornerPlanEndpoints.redo, { params: { planId: plan.id }, body, version: plan.version }),
    onSuccess: (plan) => settle(client, plan),
  });
}
