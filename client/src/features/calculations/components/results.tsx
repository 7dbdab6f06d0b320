import type { UseQueryResult } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { HttpProblem } from '../../../lib/http.ts';
import { FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';

export interface ResultsProps<Data> {
  query: UseQueryResult<Data>;
  /** Said instead of a result while inputs are missing. */
  waitsFor: string | null;
  inputs: (issueFor: (path: string) => string | undefined) => ReactNode;
  children: (data: Data) => ReactNode;
}

/** Inputs and what comes of them, side by side; a refusal stands where the result would. */
export function Results<Data>({ query, waitsFor, inputs, children }: ResultsProps<Data>) {
  const problem = waitsFor === null && query.error instanceof HttpProblem ? query.error : null;
  const isRefusal = problem !== null && problem.status < 500;
  return (
    <div className="calculator-columns">
      {inputs((path) => problem?.issueFor(path))}
      <section
        className={query.isPlaceholderData ? 'calculator-results is-behind' : 'calculator-results'}
        aria-label="Result"
        aria-live="polite"
        aria-busy={query.isFetching}
      >
        {waitsFor !== null ? <p className="refusal">{waitsFor}</p> : null}
        {isRefusal ? (
          <p className="refusal">
            <b>No figure can be given.</b>{' '}
            {problem.issues.length > 0 ? 'An input needs another look; it says so itself.' : problem.message}
          </p>
        ) : null}
        {waitsFor === null && query.isError && !isRefusal ? (
          <FailedFace
            title="The calculation could not be made."
            error={query.error}
            onRetry={() => query.refetch()}
          />
        ) : null}
        {waitsFor === null && query.isPending ? (
          <LoadingFace label="Calculating" rows={2} rowHeight={84} />
        ) : null}
        {waitsFor === null && !query.isError && query.data !== undefined ? children(query.data) : null}
      </section>
    </div>
  );
}
