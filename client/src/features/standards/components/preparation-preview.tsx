import { useQuery } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import { capitalise } from '../../../../../shared/format/labels.ts';
import { EmptyFace, FailedFace, LoadingFace } from '../../../components/ui/faces.tsx';
import { HttpProblem } from '../../../lib/http.ts';
import { preparationPreview, type GivenReadings, type PreparationMethod } from '../preparation-api.ts';
import { PreparationResult } from './preparation-result.tsx';

/** A number typed at speed is one question. */
const PAUSE_MS = 300;

function useSettled<T>(value: T): T {
  const [settled, setSettled] = useState(value);
  const text = JSON.stringify(value);
  useEffect(() => {
    const timer = setTimeout(() => setSettled(JSON.parse(text) as T), PAUSE_MS);
    return () => clearTimeout(timer);
  }, [text]);
  return settled;
}

export interface PreparationPreviewProps {
  method: PreparationMethod;
  /** null while a reading is missing. */
  given: GivenReadings | null;
  missing: string;
}

/** What the readings give, while they are typed; nothing is stored. */
export function PreparationPreview({ method, given, missing }: PreparationPreviewProps) {
  const settled = useSettled(given);
  const query = useQuery(preparationPreview(method, settled));
  if (given === null) return <EmptyFace title="No value yet.">{missing}</EmptyFace>;
  if (query.isError) {
    const isRefusal = query.error instanceof HttpProblem && query.error.status < 500;
    if (!isRefusal)
      return (
        <FailedFace title="Could not work it out." error={query.error} onRetry={() => query.refetch()} />
      );
    const [issue] = (query.error as HttpProblem).issues;
    return (
      <EmptyFace title="These readings give no solution.">
        {capitalise(issue?.message ?? query.error.message)}
      </EmptyFace>
    );
  }
  if (!query.data) return <LoadingFace label="Working it out" rows={5} rowHeight={40} />;
  return <PreparationResult preparation={query.data} hasTable />;
}
