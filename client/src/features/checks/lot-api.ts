import { infiniteQueryOptions } from '@tanstack/react-query';
import type { Check } from '../../../../shared/contracts/checks.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import { http } from '../../lib/http.ts';

const PAGE = 100;

/** Every comparison made with one lot, newest first, those that do not count included. */
export const lotChecks = (standardId: number) =>
  infiniteQueryOptions({
    queryKey: ['checks', 'list', { standardId }] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<Check>>('/api/checks', {
        query: { standardId, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });
