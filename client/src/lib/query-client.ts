import { MutationCache, QueryCache, QueryClient } from '@tanstack/react-query';
import { HttpProblem } from './http.ts';

export interface QueryClientEvents {
  /** The session has ended: any answer said 401. */
  onSignedOut?: () => void;
}

/** Live updates tell when something changed; this only guards against a missed one. */
const STALE_MS = 30_000;
const RETRIES = 2;

export function createQueryClient({ onSignedOut }: QueryClientEvents = {}): QueryClient {
  const noticeSignedOut = (error: unknown) => {
    if (error instanceof HttpProblem && error.status === 401) onSignedOut?.();
  };
  return new QueryClient({
    queryCache: new QueryCache({ onError: noticeSignedOut }),
    mutationCache: new MutationCache({ onError: noticeSignedOut }),
    defaultOptions: {
      queries: { staleTime: STALE_MS, retry: shouldRetry, refetchOnWindowFocus: true },
      // A write is never repeated unasked: the person decides.
      mutations: { retry: false },
    },
  });
}

/** A refusal stays a refusal; only a lost connection or a server in trouble is worth another try. */
export function shouldRetry(failureCount: number, error: unknown): boolean {
  if (error instanceof HttpProblem && error.status < 500) return false;
  return failureCount < RETRIES;
}
