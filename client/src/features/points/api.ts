import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Point } from '../../../../shared/contracts/points.ts';
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

export const pointDetail = (id: number) =>
  queryOptions({
    queryKey: ['points', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Point>(`/api/points/${id}`, { signal }),
  });
