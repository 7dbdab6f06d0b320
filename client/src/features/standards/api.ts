import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type {
  ChangeStandardState,
  CreateStandard,
  Standard,
} from '../../../../shared/contracts/standards.ts';
import { http } from '../../lib/http.ts';

/** A team buys a few lots a month, so one page holds years of them. */
const PAGE = 500;

export const standardsList = () =>
  queryOptions({
    queryKey: ['standards', 'list', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<Standard>>('/api/standards', { query: { limit: PAGE }, signal }),
  });

export const standardDetail = (id: number) =>
  queryOptions({
    queryKey: ['standards', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Standard>(`/api/standards/${id}`, { signal }),
  });

/** The state of a lot decides whether comparisons with it count. */
function refresh(queryClient: QueryClient) {
  return (standard: Standard) => {
    queryClient.setQueryData(standardDetail(standard.id).queryKey, standard);
    return Promise.all(
      ['standards', 'checks', 'calculations'].map((slice) =>
        queryClient.invalidateQueries({ queryKey: [slice] }),
      ),
    );
  };
}

export function useCreateStandard() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateStandard) => http.post<Standard>('/api/standards', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangeStandardState(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeStandardState) => http.post<Standard>(`/api/standards/${id}/state`, body),
    onSuccess: refresh(queryClient),
  });
}
