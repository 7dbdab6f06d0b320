import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Notice } from '../../../../shared/contracts/notices.ts';
import { http } from '../../lib/http.ts';

/** Integrity notices that nobody has closed yet. */
export const openNotices = () =>
  queryOptions({
    queryKey: ['notices', 'list', { open: '1' }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Notice>>('/api/notices', { query: { open: '1', limit: 200 }, signal }),
  });

export function useCloseNotice(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (reason: string) => http.post<Notice>(`/api/notices/${id}/close`, { reason }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['notices'] }),
  });
}
