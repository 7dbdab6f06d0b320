import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { Calculation, PlannedAnswer } from '../../../../shared/contracts/calculations.ts';
import { http } from '../../lib/http.ts';

/** The same inputs give the same answer for as long as the page is open. */
const FOREVER = { staleTime: Infinity, placeholderData: keepPreviousData } as const;

/** Figures for inputs; null while something is still missing. */
export const figuresFor = (path: string, body: object | null) =>
  queryOptions({
    queryKey: ['calculations', 'detail', path, body] as const,
    queryFn: ({ signal }) => http.post<Calculation>(`/api/calculations/${path}`, body, { signal }),
    enabled: body !== null,
    ...FOREVER,
  });

export const plannedAnswerFor = (body: object | null) =>
  queryOptions({
    queryKey: ['calculations', 'detail', 'planned-comparison', body] as const,
    queryFn: ({ signal }) =>
      http.post<PlannedAnswer>('/api/calculations/planned-comparison', body, { signal }),
    enabled: body !== null,
    ...FOREVER,
  });
