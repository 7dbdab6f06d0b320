import { queryOptions } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Site } from '../../../../shared/contracts/sites.ts';
import { http } from '../../lib/http.ts';

/** The sites a person may see, with their areas. An organisation has tens of them, so one page holds them all. */
export const sitesList = () =>
  queryOptions({
    queryKey: ['sites', 'list', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<Site>>('/api/sites', { query: { limit: 500 }, signal }),
  });

export const siteDetail = (id: number) =>
  queryOptions({
    queryKey: ['sites', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Site>(`/api/sites/${id}`, { signal }),
  });
