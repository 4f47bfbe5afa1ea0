import { QueryClient } from '@tanstack/react-query';
import { ApiError } from './api-error.js';

const RETRIES = 2;

/** What the server refused stays refused; only a lost connection or a busy server is worth another try. */
function isWorthRetrying(failureCount: number, error: Error): boolean {
  if (failureCount >= RETRIES || !(error instanceof ApiError)) return false;
  return error.code === 'offline' || error.code === 'not-ready';
}

export const queryClient = new QueryClient({
  defaultOptions: {
    queries: { retry: isWorthRetrying, staleTime: 30_000, refetchOnWindowFocus: true },
    mutations: { retry: false },
  },
});
