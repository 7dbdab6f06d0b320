import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Area, ChangeSite, CreateSite, Site } from '../../../../shared/contracts/sites.ts';
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

function refresh(queryClient: QueryClient) {
  return () =>
    Promise.all(
      ['sites', 'points', 'readings'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })),
    );
}

export function useCreateSite() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateSite) => http.post<Site>('/api/sites', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangeSite(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeSite) => http.patch<Site>(`/api/sites/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useAddArea(siteId: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (name: string) => http.post<Area>(`/api/sites/${siteId}/areas`, { name }),
    onSuccess: refresh(queryClient),
  });
}

export function useRenameArea(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { name: string; reason: string }) => http.patch<Area>(`/api/areas/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}
