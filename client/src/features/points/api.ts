import type { QueryClient } from '@tanstack/react-query';
import {
  infiniteQueryOptions,
  keepPreviousData,
  queryOptions,
  useMutation,
  useQueryClient,
} from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { ChangePoint, CreatePoint, Point, PointProbe } from '../../../../shared/contracts/points.ts';
import { http } from '../../lib/http.ts';

export interface PointFilters {
  siteId?: number | null;
  areaId?: number | null;
  q?: string;
  /** Only points without a probe. */
  free?: boolean;
  limit?: number;
}

export const pointsList = ({ free, ...filters }: PointFilters) =>
  queryOptions({
    queryKey: ['points', 'list', { ...filters, free }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Point>>('/api/points', { query: { ...filters, free: free ? '1' : null }, signal }),
    placeholderData: keepPreviousData,
  });

export interface PointPageFilters {
  q?: string;
  siteId?: number;
  areaId?: number;
  free?: '1';
  retired?: '1';
}

/** Enough for several screens; the next page is asked for before the end is reached. */
const PAGE = 100;

export const pointPages = (filters: PointPageFilters) =>
  infiniteQueryOptions({
    queryKey: ['points', 'list', filters, 'pages'] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<Point>>('/api/points', {
        query: { ...filters, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    placeholderData: keepPreviousData,
  });

export const pointDetail = (id: number) =>
  queryOptions({
    queryKey: ['points', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Point>(`/api/points/${id}`, { signal }),
  });

/** The probes that stood at a point, newest first; the present one included. */
export const pointProbes = (id: number) =>
  queryOptions({
    queryKey: ['points', 'detail', id, 'probes', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<PointProbe>>(`/api/points/${id}/probes`, { signal }),
  });

/** Requirements decide how every reading there is judged. */
function refresh(queryClient: QueryClient) {
  return (point: Point) => {
    queryClient.setQueryData(pointDetail(point.id).queryKey, point);
    return Promise.all(
      ['points', 'probes', 'readings', 'sites'].map((slice) =>
        queryClient.invalidateQueries({ queryKey: [slice] }),
      ),
    );
  };
}

export function useCreatePoint() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreatePoint) => http.post<Point>('/api/points', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangePoint(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangePoint) => http.patch<Point>(`/api/points/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useRetirePoint(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { reason: string; version: number }) =>
      http.post<Point>(`/api/points/${id}/retire`, body),
    onSuccess: refresh(queryClient),
  });
}
