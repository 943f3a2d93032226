import { QueryClient } from '@tanstack/react-query';

/** One failed try is repeated once: a passing fault heals, a lasting one is shown soon. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: { queries: { staleTime: 10_000, retry: shouldRetry } },
  });
}

/** A refusal (4xx) will be refused again; only silence and server faults are worth a second try. */
function shouldRetry(failureCount: number, error: Error): boolean {
  const status = 'status' in error && typeof error.status === 'number' ? error.status : null;
  return failureCount < 1 && (status === null || status >= 500);
}
