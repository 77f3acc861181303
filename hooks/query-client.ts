import { QueryClient } from '@tanstack/react-query';
import { ApiProblem } from './api';

/** How long an answer counts as fresh, ms. */
export const STALE = { live: 0, list: 10_000, slow: 60_000 } as const;

/** One client for the whole app: refusals are not repeated, a silent server is asked twice more. */
export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: STALE.list,
        retry: (count, error) => (passes(error) ? count < 4 : !(error instanceof ApiProblem) && count < 2),
      },
      mutations: { retry: false },
    },
  });
}

/** 503: the server is there, its database or a start-up is not yet. It passes by itself. */
const passes = (error: Error) => error instanceof ApiProblem && error.status === 503;
