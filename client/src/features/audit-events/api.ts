import { infiniteQueryOptions, keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { AuditEventView, ChainReport } from '../../../../shared/contracts/audit-events.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import { http } from '../../lib/http.ts';

export interface AuditFilters {
  objectKind?: string;
  objectId?: string;
  action?: string;
  actorId?: number;
  /** RFC 3339 instants: from (included) to (excluded). */
  from?: string;
  to?: string;
}

const PAGE = 100;

export const auditEventsList = (filters: AuditFilters) =>
  infiniteQueryOptions({
    queryKey: ['audit-events', 'list', filters] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<AuditEventView>>('/api/audit-events', {
        query: { ...filters, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });

/** A check of the whole chain reads every event, so it runs only when somebody asks. */
export const chainIntegrity = () =>
  queryOptions({
    queryKey: ['audit-events', 'detail', 'integrity'] as const,
    queryFn: ({ signal }) => http.get<ChainReport>('/api/audit-events/integrity', { signal }),
    enabled: false,
    staleTime: Infinity,
  });
