import { queryOptions } from '@tanstack/react-query';
import { estimateEndpoints } from '@/shared/estimates.ts';
import { apiCall } from './call.ts';
import { estimatesRoot as root } from './roots.ts';

/** What a plan costs beside other ways to cut the same, of the version that is seen: planned again it is another. */
export const planEstimateQuery = (planId: string, version: number) =>
  queryOptions({
    queryKey: [...root, planId, version],
    queryFn: ({ signal }) => apiCall(estimateEndpoints.plan, { params: { planId }, signal }),
  });
