import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { z } from 'zod';
import type { searchAnswer } from '../../../../shared/contracts/search.ts';
import { http } from '../../lib/http.ts';

/** Probes by tag or serial number, measuring points by code or name. */
export const searchList = (q: string) =>
  queryOptions({
    queryKey: ['search', 'list', { q }] as const,
    queryFn: ({ signal }) => http.get<z.infer<typeof searchAnswer>>('/api/search', { query: { q }, signal }),
    enabled: q !== '',
    placeholderData: keepPreviousData,
  });
