import { QueryClient } from '@tanstack/vue-query';
import { ApiError } from './api-error';

/** Server data lives here, never in a store. What the server refused is not asked again; a broken line is, twice. */
export function makeQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 10_000,
        gcTime: 5 * 60_000,
        refetchOnWindowFocus: true,
        retry: (failures, error) =>
          failures < 2 && error instanceof ApiError && (error.isOffline || error.status >= 502),
      },
      mutations: { retry: false },
    },
  });
}
