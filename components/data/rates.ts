import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { rateEndpoints, type PlantRates, type RatesForm } from '@/shared/rates.ts';
import { apiCall } from './call.ts';
import { estimatesRoot } from './roots.ts';

const root = ['rates'] as const;

/** What the plant pays. */
export const ratesQuery = () =>
  queryOptions({ queryKey: root, queryFn: ({ signal }) => apiCall(rateEndpoints.get, { signal }) });

export function useRatesChange() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ seen, form }: { seen: Pick<PlantRates, 'version'>; form: RatesForm }) =>
      apiCall(rateEndpoints.change, { body: form, version: seen.version }),
    onSuccess: async (rates) => {
      client.setQueryData(ratesQuery().queryKey, rates);
      await client.invalidateQueries({ queryKey: estimatesRoot });
    },
  });
}
