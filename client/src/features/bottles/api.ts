import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type {
  Bottle,
  DiscardBottle,
  ReceiveBottles,
  SetRemaining,
} from '../../../../shared/contracts/bottles.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import { http } from '../../lib/http.ts';

/** A lot has a few dozen bottles at most. */
const PAGE = 500;

export const bottlesOfLot = (standardId: number) =>
  queryOptions({
    queryKey: ['bottles', 'list', { standardId }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Bottle>>('/api/bottles', { query: { standardId, limit: PAGE }, signal }),
  });

export const bottleLabel = (id: number): string => `/api/bottles/${id}/label.svg`;

const refresh = (queryClient: QueryClient) => () =>
  Promise.all(['bottles', 'standards'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })));

export function useReceiveBottles() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ReceiveBottles) => http.post<{ items: Bottle[] }>('/api/bottles', body),
    onSuccess: refresh(queryClient),
  });
}

export function useOpenBottle() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: ({ id, version }: Pick<Bottle, 'id' | 'version'>) =>
      http.post<Bottle>(`/api/bottles/${id}/open`, { version }),
    onSuccess: refresh(queryClient),
  });
}

export function useSetRemaining(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SetRemaining) => http.post<Bottle>(`/api/bottles/${id}/remaining`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useDiscardBottle(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: DiscardBottle) => http.post<Bottle>(`/api/bottles/${id}/discard`, body),
    onSuccess: refresh(queryClient),
  });
}
