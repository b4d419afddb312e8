import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { revisionEndpoints, type Revision, type StrategyContent } from '@/shared/strategies.ts';
import { apiCall } from './call.ts';
import { isProblem } from './problem.ts';
import { cardsRoot, reviewsRoot, revisionsRoot as root, strategiesRoot } from './roots.ts';

export const revisionQuery = (revisionId: string) =>
  queryOptions({
    queryKey: [...root, 'one', revisionId],
    queryFn: ({ signal }) => apiCall(revisionEndpoints.get, { params: { revisionId }, signal }),
  });

/** A revision that somebody is looking at, and has decided on as it was then. */
type Seen = Pick<Revision, 'id' | 'version'>;

async function settle(client: QueryClient, revision: Revision): Promise<void> {
  client.setQueryData(revisionQuery(revision.id).queryKey, revision);
  await Promise.all([strategiesRoot, reviewsRoot, cardsRoot].map((queryKey) => client.invalidateQueries({ queryKey })));
}

/** Saves a draft's content; the answer carries the server's prediction. */
export function useRevisionSave() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ revision, content }: { revision: Seen; content: StrategyContent }) =>
      apiCall(revisionEndpoints.save, {
        params: { revisionId: revision.id },
        body: { content },
        version: revision.version,
      }),
    onSuccess: (revision) => settle(client, revision),
  });
}

function useDecision(endpoint: (typeof revisionEndpoints)['submit' | 'approve' | 'giveBack' | 'withdraw']) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: ({ revision, words }: { revision: Seen; words: string }) =>
      apiCall(endpoint, { params: { revisionId: revision.id }, body: { words }, version: revision.version }),
    onSuccess: async (revision) => {
      await settle(client, revision);
      // Approving supersedes another revision, so the others are asked for again too.
      await client.invalidateQueries({ queryKey: root });
    },
    onError: async (error) => {
      // What is in its way may have come since it was read, as a house rule may.
      if (isProblem(error, 'wrong-state')) await client.invalidateQueries({ queryKey: root });
    },
  });
}

export const useRevisionSubmit = () => useDecision(revisionEndpoints.submit);
export const useRevisionApprove = () => useDecision(revisionEndpoints.approve);
export const useRevisionReturn = () => useDecision(revisionEndpoints.giveBack);
export const useRevisionWithdraw = () => useDecision(revisionEndpoints.withdraw);
