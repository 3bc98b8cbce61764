import { QueryClient } from '@tanstack/react-query';
import { ApiError } from '#client/api/ApiError.ts';

/** The updates stream says when something changed; a page that is looked at again after this long asks anyway. */
const STALE_AFTER_MILLISECONDS = 30_000;
const RETRY_MAXIMUM_COUNT = 3;

let pageClient: QueryClient | null = null;

/**
 * The one cache that all islands of a page share; on the server a new one for each render, because one
 * reader's answers must never be another's.
 */
export function queryClientOfPage(): QueryClient {
  if (import.meta.env.SSR) return createQueryClient();
  pageClient ??= createQueryClient();
  return pageClient;
}

function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: STALE_AFTER_MILLISECONDS,
        retry: (failureCount, error) =>
          failureCount < RETRY_MAXIMUM_COUNT && error instanceof ApiError && error.isTransient,
      },
      mutations: { retry: false },
    },
  });
}
