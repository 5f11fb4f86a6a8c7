import { QueryClient } from '@tanstack/vue-query';
import { ApiError } from '@/api/ApiError';

const retries = 2;

/** An answer that says no stays no; only faults of the way there are tried again. */
const isWorthRetrying = (error: unknown): boolean => !(error instanceof ApiError) || error.status >= 500;

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 5_000,
        retry: (failureCount, error) => failureCount < retries && isWorthRetrying(error),
        refetchOnWindowFocus: true,
      },
    },
  });
}
