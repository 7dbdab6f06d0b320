import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type {
  CreateDilutedStandard,
  CreatePreparedStandard,
  DilutedPreparation,
  Preparation,
  WeighedPreparation,
} from '../../../../shared/contracts/preparations.ts';
import type { Standard, StandardStateChange, StandardUses } from '../../../../shared/contracts/standards.ts';
import { http } from '../../lib/http.ts';

export type PreparationMethod = 'prepared' | 'diluted';
export type GivenReadings = WeighedPreparation | DilutedPreparation;

/** What the readings would give; asked while they are typed, nothing is stored. */
export const preparationPreview = (method: PreparationMethod, given: GivenReadings | null) =>
  queryOptions({
    queryKey: ['standards', 'list', 'preview', method, given] as const,
    queryFn: ({ signal }) => http.post<Preparation>(`/api/standards/${method}/preview`, given, { signal }),
    enabled: given !== null,
    placeholderData: keepPreviousData,
    retry: false,
  });

export function useMakeLot(method: PreparationMethod) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreatePreparedStandard | CreateDilutedStandard) =>
      http.post<Standard>(`/api/standards/${method}`, body),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['standards'] }),
  });
}

export const lotHistory = (id: number) =>
  queryOptions({
    queryKey: ['standards', 'detail', id, 'history', {}] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<StandardStateChange>>(`/api/standards/${id}/history`, { signal }),
  });

export const lotUses = (id: number) =>
  queryOptions({
    queryKey: ['standards', 'detail', id, 'uses', {}] as const,
    queryFn: ({ signal }) => http.get<StandardUses>(`/api/standards/${id}/uses`, { signal }),
  });
