import { QueryClient } from '@tanstack/react-query';
import { isApiError } from './api-error.ts';

/** One for the page, outside React, so that route loaders start requests before a component exists. */
export const queryClient = new QueryClient({
  defaultOptions: {
    queries: {
      staleTime: 15_000,
      gcTime: 10 * 60_000,
      refetchOnWindowFocus: false,
      // A "no" stays a no; a lost line or a hiccup of the server is worth two more tries.
      retry: (count, error) => count < 2 && isApiError(error) && (error.status === 0 || error.status >= 500),
      retryDelay: (count) => Math.min(1000 * 2 ** count, 8000),
      // Cached pages stay readable without a line; a request is tried and says so when it fails.
      networkMode: 'always',
    },
    mutations: { retry: false, networkMode: 'always' },
  },
});
