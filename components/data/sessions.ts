import { queryOptions, useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import type { Actor } from '@/shared/policy.ts';
import { sessionEndpoints, type Session } from '@/shared/sessions.ts';
import type { BodyOf } from '@/shared/endpoint.ts';
import { apiCall } from './call.ts';
import { setExpired } from './expiry.ts';
import { forgetKeptCards } from './kept-cards.ts';
import { isProblem } from './problem.ts';

const root = ['session'] as const;

/** Who is signed in; null for nobody. */
export const sessionQuery = () =>
  queryOptions({
    queryKey: [...root, 'current'],
    queryFn: async ({ client, queryKey, signal }): Promise<Session | null> => {
      try {
        return await apiCall(sessionEndpoints.current, { signal });
      } catch (error) {
        if (!isProblem(error, 'signed-out')) throw error;
        const before = client.getQueryData<Session | null>(queryKey);
        // Was somebody at work here? Then the page stays and the sign-in is asked for above it.
        if (before === undefined || before === null) return null;
        setExpired(true);
        return before;
      }
    },
    staleTime: 60_000,
  });

/** What the sign-in page needs to know; the demo's accounts on a demo only. */
export const welcomeQuery = () =>
  queryOptions({
    queryKey: [...root, 'welcome'],
    queryFn: ({ signal }) => apiCall(sessionEndpoints.welcome, { signal }),
    staleTime: Infinity,
  });

export const actorOf = (session: Session): Actor => ({
  userId: session.user.id,
  plantId: session.plant.id,
  role: session.role,
  mayApprove: session.mayApprove,
});

/** Everything of another person or plant goes; the new session stays. */
function begin(client: QueryClient, session: Session | null): void {
  client.removeQueries({ predicate: (query) => query.queryKey[0] !== root[0] });
  client.setQueryData(sessionQuery().queryKey, session);
}

export function useSignIn() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: BodyOf<typeof sessionEndpoints.signIn>) => apiCall(sessionEndpoints.signIn, { body }),
    onSuccess: async (session) => {
      const before = client.getQueryData(sessionQuery().queryKey);
      const same = before?.user.id === session.user.id && before.plant.id === session.plant.id;
      setExpired(false);
      if (same) {
        client.setQueryData(sessionQuery().queryKey, session);
        await client.invalidateQueries({ predicate: (query) => query.queryKey[0] !== root[0] });
      } else {
        forgetKeptCards();
        begin(client, session);
      }
    },
  });
}

export function useSignOut() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => apiCall(sessionEndpoints.signOut, {}),
    onSuccess: () => {
      setExpired(false);
      forgetKeptCards();
      begin(client, null);
    },
  });
}

export function useChoosePlant() {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (plantId: string) => apiCall(sessionEndpoints.choosePlant, { body: { plantId } }),
    onSuccess: (session) => {
      forgetKeptCards();
      begin(client, session);
    },
  });
}
