import { QueryClient } from '@tanstack/react-query';
import { ApiError } from './api-error.js';

const RETRIES = 2;

/** What the server refused stays refused; only a lost connection or a busy server is worth another try. */
function isWorthRetrying(failureCount: number, error: Error): boolean {
  if (failureCount >= RETRIES || !(error instanceof ApiError)) return false;
  return error.code === 'offline' || error.code === 'not-ready';
}

/**
 * Without a connection a query is still tried once, as `/try` needs none; one that needs it waits for the next one
 * and fails nothing on the screen. Changes are never held back in secret: they are sent, or said to be refused.
 */
export const queryClient = new QueryClient({
  defaultOptions: {
    queries: { networkMode: 'offlineFirst', retry: isWorthRetrying, staleTime: 30_000, refetchOnWindowFocus: true },
    mutations: { networkMode: 'always', retry: false },
  },
});
