import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { HttpProblem } from '../../lib/http.ts';
import { EmptyFace, FailedFace, LoadingFace } from './faces.tsx';

export interface AnswerProps<Data> {
  query: UseQueryResult<Data>;
  /** What is asked for, as the sentences name it: "the probe", "the checks". */
  what: string;
  /** In the shape of what will come. */
  loading?: ReactNode;
  /** Instead of the plain face when the server says that there is no such thing. */
  missing?: ReactNode;
  children: (data: Data) => ReactNode;
}

/**
 * The faces of one question to the server: on its way, failed with a retry, not there, answered. An answer once seen
 * stays on screen while a later fetch fails: the banner tells about the connection.
 */
export function Answer<Data>({ query, what, loading, missing, children }: AnswerProps<Data>) {
  if (query.data !== undefined) return children(query.data);
  if (query.isPending) return loading ?? <LoadingFace label={`Fetching ${what}`} />;
  if (query.error instanceof HttpProblem && [403, 404].includes(query.error.status)) {
    return missing ?? <EmptyFace title={query.error.message} />;
  }
  return (
    <FailedFace title={`Could not fetch ${what}.`} error={query.error} onRetry={() => query.refetch()} />
  );
}
