import { infiniteQueryOptions, keepPreviousData } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Mail } from '../../../../shared/contracts/mails.ts';
import { http } from '../../lib/http.ts';

const PAGE = 50;

/** The outbox, newest first. */
export const mailsList = (filters: { q?: string }) =>
  infiniteQueryOptions({
    queryKey: ['mails', 'list', filters] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<Mail>>('/api/mails', { query: { ...filters, limit: PAGE, cursor: pageParam }, signal }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });
