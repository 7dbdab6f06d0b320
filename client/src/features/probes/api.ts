import type { QueryClient } from '@tanstack/react-query';
import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type {
  ChangeProbe,
  InstallProbe,
  MoveProbe,
  Probe,
  ProbeEvent,
  ProbeRow,
  ProbesQuery,
  RegisterProbe,
  RemoveProbe,
} from '../../../../shared/contracts/probes.ts';
import { http } from '../../lib/http.ts';

export type ProbeFilters = Partial<Pick<ProbesQuery, 'q' | 'siteId' | 'kind' | 'status' | 'trust' | 'sort'>>;

/** Enough for several screens; the next page is asked for before the end is reached. */
const PAGE = 100;
/** A probe with an automatic check has several events a day; most of them fold into one line. */
const EVENTS = 200;

export const probesList = (filters: ProbeFilters) =>
  infiniteQueryOptions({
    queryKey: ['probes', 'list', filters] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<ProbeRow>>('/api/probes', {
        query: { ...filters, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });

export const probeDetail = (id: number) =>
  queryOptions({
    queryKey: ['probes', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Probe>(`/api/probes/${id}`, { signal }),
    // Trust also changes by mere passing of time.
    refetchInterval: 30_000,
  });

export const probeEvents = (id: number) =>
  infiniteQueryOptions({
    queryKey: ['probes', 'detail', id, 'events', {}] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<ProbeEvent>>(`/api/probes/${id}/events`, {
        query: { limit: EVENTS, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });

/** A move of a probe also changes points and the live board. */
function refresh(queryClient: QueryClient) {
  return (probe: Probe) => {
    queryClient.setQueryData(probeDetail(probe.id).queryKey, probe);
    return Promise.all(
      ['probes', 'points', 'readings', 'devices', 'sites'].map((slice) =>
        queryClient.invalidateQueries({ queryKey: [slice] }),
      ),
    );
  };
}

export function useRegisterProbe() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: RegisterProbe) => http.post<Probe>('/api/probes', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangeProbe(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeProbe) => http.patch<Probe>(`/api/probes/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}

interface Placements {
  install: InstallProbe;
  move: MoveProbe;
  remove: RemoveProbe;
  retire: { reason: string; version: number };
}

/** What changes where a probe stands: install, move, remove, retire. */
export function usePlaceProbe<Step extends keyof Placements>(id: number, step: Step) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: Placements[Step]) => http.post<Probe>(`/api/probes/${id}/${step}`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useAddNote(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (text: string) => http.post<ProbeEvent>(`/api/probes/${id}/notes`, { text }),
    onSuccess: () => queryClient.invalidateQueries({ queryKey: ['probes', 'detail', id] }),
  });
}
