import type { RefObject } from 'react';
import { useEffect, useState } from 'react';
import { HttpProblem } from './http.ts';

export interface Submission {
  isPending: boolean;
  /** The refusal as a whole, when no single field is to blame. */
  refusal: string | null;
  /** What is wrong with one field, by its contract path. */
  issueFor: (path: string) => string | undefined;
  /** Runs the write once; resolves to whether it was accepted. Issues found here already keep it from being sent. */
  submit: (write: () => Promise<unknown>, found?: Issues) => Promise<boolean>;
}

/** What is wrong, by contract path. */
export type Issues = Readonly<Record<string, string | undefined>>;

/**
 * The life of one form: pending, refused field by field, or done. The server is the judge; its sentences stand beside
 * the fields they name, and the first such field takes the focus.
 */
export function useSubmission(form?: RefObject<HTMLElement | null>): Submission {
  const [isPending, setIsPending] = useState(false);
  const [error, setError] = useState<unknown>(null);
  const [found, setFound] = useState<Issues>({});
  useEffect(() => {
    if (error || Object.keys(found).length > 0)
      form?.current?.querySelector<HTMLElement>('[aria-invalid="true"]')?.focus();
  }, [error, found, form]);
  const problem = error instanceof HttpProblem ? error : null;
  return {
    isPending,
    refusal: error && !(problem && problem.issues.length > 0) ? sentenceOf(error) : null,
    issueFor: (path) => found[path] ?? problem?.issueFor(path),
    submit: async (write, issues = {}) => {
      if (isPending) return false;
      setError(null);
      setFound(issues);
      if (isAny(issues)) return false;
      setIsPending(true);
      try {
        await write();
        return true;
      } catch (failure) {
        setError(failure);
        return false;
      } finally {
        setIsPending(false);
      }
    },
  };
}

function isAny(issues: Issues): boolean {
  return Object.values(issues).some((issue) => issue !== undefined);
}

function sentenceOf(error: unknown): string {
  return error instanceof Error ? error.message : 'This could not be done. Try again.';
}
