import { QueryClient } from '@tanstack/react-query';

import { ApiError } from './api-client';

/** Refusals are answers and are not asked again; a lost connection is tried twice more. */
export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        retry: (failures, error) =>
          error instanceof ApiError && error.code === 'no-connection' && failures < 2,
      },
    },
  });
}
