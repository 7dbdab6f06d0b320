import { infiniteQueryOptions } from '@tanstack/react-query';
import type { Check } from '../../../../shared/contracts/checks.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import { http } from '../../lib/http.ts';

/** Two years of weekly comparisons fit into one page; a daily one takes two. */
const PAGE = 400;

/** The comparisons of one probe, newest first, those that do not count included. */
export const probeChecks = (probeId: number) =>
  infiniteQueryOptions({
    queryKey: ['checks', 'list', { probeId }] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<Check>>('/api/checks', { query: { probeId, limit: PAGE, cursor: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
