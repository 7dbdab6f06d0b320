import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type {
  ChangeInstrument,
  CreateInstrument,
  Instrument,
  InstrumentUse,
} from '../../../../shared/contracts/instruments.ts';
import { http } from '../../lib/http.ts';

/** A team has a few dozen instruments. */
const PAGE = 500;

export const instrumentsList = () =>
  queryOptions({
    queryKey: ['instruments', 'list', {}] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Instrument>>('/api/instruments', { query: { limit: PAGE }, signal }),
  });

export const instrumentDetail = (id: number) =>
  queryOptions({
    queryKey: ['instruments', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Instrument>(`/api/instruments/${id}`, { signal }),
  });

export const instrumentUses = (id: number) =>
  queryOptions({
    queryKey: ['instruments', 'detail', id, 'uses', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<InstrumentUse>>(`/api/instruments/${id}/uses`, { signal }),
  });

const refresh = (queryClient: QueryClient) => (instrument: Instrument) => {
  queryClient.setQueryData(instrumentDetail(instrument.id).queryKey, instrument);
  return queryClient.invalidateQueries({ queryKey: ['instruments'] });
};

export function useCreateInstrument() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateInstrument) => http.post<Instrument>('/api/instruments', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangeInstrument(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeInstrument) => http.patch<Instrument>(`/api/instruments/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}
