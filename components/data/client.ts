import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { setExpired } from './expiry.ts';
import { isProblem } from './problem.ts';

/** Asked again by themselves only when the connection was lost; every other answer stays what it is. */
const retries = 2;

const noticeExpiry = (error: unknown) => {
  if (isProblem(error, 'signed-out')) setExpired(true);
};

export function createQueryClient(): QueryClient {
  return new QueryClient({
    queryCache: new QueryCache({ onError: noticeExpiry }),
    mutationCache: new MutationCache({ onError: noticeExpiry }),
    defaultOptions: {
      queries: {
        staleTime: 20_000,
        gcTime: 10 * 60_000,
        // The browser's word on being online is often wrong in a hall: ask, and say when no answer came.
        networkMode: 'always',
        retry: (count, error) => isProblem(error, 'lost-connection') && count < retries,
        retryDelay: (count) => 700 * 2 ** count,
      },
      mutations: { networkMode: 'always', retry: false },
    },
  });
}
