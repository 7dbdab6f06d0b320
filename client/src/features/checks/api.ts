import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import type { Check, CheckHistory } from '../../../../shared/contracts/checks.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import { http } from '../../lib/http.ts';

const PAGE = 50;

/** The comparisons of one probe, newest first, those that do not count included. */
export const probeChecks = (probeId: number) =>
  infiniteQueryOptions({
    queryKey: ['checks', 'list', { probeId }] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<Check>>('/api/checks', { query: { probeId, limit: PAGE, cursor: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });

/** What the history of a cell constant is drawn from, in at most 1 000 points. */
export const probeHistory = (probeId: number) =>
  queryOptions({
    queryKey: ['checks', 'detail', probeId, 'history', {}] as const,
    queryFn: ({ signal }) => http.get<CheckHistory>('/api/checks/history', { query: { probeId }, signal }),
  });
