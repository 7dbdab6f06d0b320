import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { IssueProcedure, Procedure } from '../../../../shared/contracts/procedures.ts';
import { http } from '../../lib/http.ts';

export const proceduresList = () =>
  queryOptions({
    queryKey: ['procedures', 'list', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<Procedure>>('/api/procedures', { signal }),
  });

/** Every version of one procedure, newest first. */
export const procedureVersions = (code: string) =>
  queryOptions({
    queryKey: ['procedures', 'list', { code, all: '1' }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Procedure>>('/api/procedures', { query: { code, all: '1' }, signal }),
  });

export const procedureDetail = (id: number) =>
  queryOptions({
    queryKey: ['procedures', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Procedure>(`/api/procedures/${id}`, { signal }),
  });

export function useIssueProcedure(code: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: IssueProcedure) =>
      http.post<Procedure>(`/api/procedures/${encodeURIComponent(code)}/versions`, body),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['procedures'] }),
  });
}
