import { queryOptions } from '@tanstack/react-query';
import { reviewEndpoints } from '@/shared/strategies.ts';
import { apiCall } from './call.ts';
import { reviewsRoot as root } from './roots.ts';

/** Revisions waiting for a decision. */
export const reviewsQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(reviewEndpoints.list, { signal })).items,
  });
