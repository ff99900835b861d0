import { QueryClient } from '@tanstack/react-query';
import { isPassing } from './api-problem';
import { staleTimes } from './stale-times';

/** Doubling waits with jitter, so that the screens of a workshop do not all knock at once after a restart. */
export const waitBefore = (attempt: number, random: () => number = Math.random): number =>
  Math.min(15_000, 500 * 2 ** attempt) * (0.75 + random() / 2);

/** The cache of everything asked for. */
export const makeQueryClient = (): QueryClient =>
  new QueryClient({
    defaultOptions: {
      queries: {
        // The workshop's server may be reachable while the browser says 'offline', and the other way round.
        networkMode: 'always',
        staleTime: staleTimes.setUp,
        gcTime: 30 * 60_000,
        retry: (failures, error) => failures < 3 && isPassing(error),
        retryDelay: (attempt) => waitBefore(attempt),
      },
      // A write is repeated by a person, with the same idempotency key; never behind their back.
      mutations: { networkMode: 'always', retry: false },
    },
  });

export const queryClient = makeQueryClient();
