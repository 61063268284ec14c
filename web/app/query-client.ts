/** The store of answers. It is emptied at sign-out and whenever the study or the role changes. */
import { QueryClient } from '@tanstack/react-query';
import { ApiProblem } from './problem.ts';

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: {
      staleTime: 15_000,
      gcTime: 5 * 60_000,
      refetchOnWindowFocus: false,
      // A refusal stays a refusal; only a lost connection and a busy server are tried again.
      retry: (count, error) =>
        count < 2 && error instanceof ApiProblem && (error.status === 0 || error.status >= 502),
    },
    mutations: { retry: false },
  },
});
