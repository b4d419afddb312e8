import { keepPreviousData, queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { BodyOf } from '@/shared/endpoint.ts';
import { houseRuleEndpoints, type HouseRule } from '@/shared/house-rules.ts';
import { revisionEndpoints, type StrategyContent } from '@/shared/strategies.ts';
import { apiCall } from './call.ts';
import { cardsRoot, revisionsRoot, strategiesRoot } from './roots.ts';

const root = ['house-rules'] as const;

/** What the plant asks of every pierce; ended rules last. */
export const houseRulesQuery = () =>
  queryOptions({
    queryKey: [...root, 'list'],
    queryFn: async ({ signal }) => (await apiCall(houseRuleEndpoints.list, { signal })).items,
  });

/** The named results of the revision changed last; null while there is none. */
export const houseRuleExampleQuery = () =>
  queryOptions({
    queryKey: [...root, 'example'],
    queryFn: async ({ signal }) => (await apiCall(houseRuleEndpoints.example, { signal })).example,
  });

/** What the server makes of an expression. What was said of the last one stays while the next is read. */
export const houseRuleReadingQuery = (expression: string) =>
  queryOptions({
    queryKey: [...root, 'reading', expression],
    queryFn: ({ signal }) => apiCall(houseRuleEndpoints.read, { body: { expression }, signal }),
    placeholderData: keepPreviousData,
    gcTime: 60_000,
  });

/** What the rules in force say of content that is not saved. What was said before stays while it is asked. */
export const houseRuleVerdictsQuery = (content: StrategyContent) =>
  queryOptions({
    queryKey: [...root, 'verdicts', content],
    queryFn: async ({ signal }) => (await apiCall(revisionEndpoints.judge, { body: { content }, signal })).items,
    placeholderData: keepPreviousData,
    gcTime: 60_000,
  });

/** Drafts are judged anew, and checks and cards take their least reserves from the rules. */
const settle = (client: QueryClient) =>
  Promise.all(
    [root, revisionsRoot, strategiesRoot, cardsRoot].map((queryKey) => client.invalidateQueries({ queryKey })),
  );

export function useHouseRuleAdd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof houseRuleEndpoints.add>) => apiCall(houseRuleEndpoints.add, { body }),
    onSuccess: () => settle(client),
  });
}

/** A rule that somebody is looking at, and writes over as it was then. */
type Seen = Pick<HouseRule, 'id' | 'version'>;

export function useHouseRuleChange() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ rule, text }: { rule: Seen; text: BodyOf<typeof houseRuleEndpoints.change> }) =>
      apiCall(houseRuleEndpoints.change, { params: { ruleId: rule.id }, body: text, version: rule.version }),
    onSuccess: () => settle(client),
  });
}

export function useHouseRuleEnd() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (rule: Seen) => apiCall(houseRuleEndpoints.end, { params: { ruleId: rule.id }, version: rule.version }),
    onSuccess: () => settle(client),
  });
}
