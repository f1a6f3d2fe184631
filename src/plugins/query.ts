import { QueryClient } from '@tanstack/vue-query';
import { ApiError } from '@/api/api-error.ts';

const NETWORK_RETRIES = 2;

/** Refusals are answers and not repeated; only a server that could not be reached is asked again. */
function shouldRetry(failures: number, error: Error): boolean {
  return error instanceof ApiError && error.isUnreachable && failures < NETWORK_RETRIES;
}

export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      // 'always': without a network a page says so at once, rather than waiting silently for it.
      queries: { retry: shouldRetry, staleTime: 15_000, refetchOnWindowFocus: true, networkMode: 'always' },
      mutations: { retry: false, networkMode: 'always' },
    },
  });
}
