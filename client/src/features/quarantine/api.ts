import {
  infiniteQueryOptions,
  keepPreviousData,
  queryOptions,
  useMutation,
  useQueryClient,
} from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { QuarantinedMessage } from '../../../../shared/contracts/quarantine.ts';
import { http } from '../../lib/http.ts';

export interface QuarantineFilters {
  q?: string;
  code?: string;
  open?: '1';
}

/** A message carries its raw content, so a page is kept small. */
const PAGE = 50;

export const quarantineList = (filters: QuarantineFilters) =>
  infiniteQueryOptions({
    queryKey: ['quarantine', 'list', filters] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<QuarantinedMessage>>('/api/quarantine', {
        query: { ...filters, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });

export const quarantinedDetail = (id: number) =>
  queryOptions({
    queryKey: ['quarantine', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<QuarantinedMessage>(`/api/quarantine/${id}`, { signal }),
  });

export function useResolveMessage(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (reason: string) =>
      http.post<QuarantinedMessage>(`/api/quarantine/${id}/resolve`, { reason }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['quarantine'] }),
  });
}
