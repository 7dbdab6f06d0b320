import type { QueryClient } from '@tanstack/react-query';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { ChangeUser, CreateUser, User } from '../../../../shared/contracts/users.ts';
import { http } from '../../lib/http.ts';

/** The people of an organisation: tens of them, in one answer. */
export const usersList = () =>
  queryOptions({
    queryKey: ['users', 'list', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<User>>('/api/users', { signal }),
  });

export const userDetail = (id: number) =>
  queryOptions({
    queryKey: ['users', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<User>(`/api/users/${id}`, { signal }),
  });

function refresh(queryClient: QueryClient) {
  return () =>
    Promise.all(['users', 'mails'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })));
}

export function useCreateUser() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: CreateUser) => http.post<User>('/api/users', body),
    onSuccess: refresh(queryClient),
  });
}

export function useChangeUser(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: ChangeUser) => http.patch<User>(`/api/users/${id}`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useDeactivateUser(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: { reason: string; version: number }) =>
      http.post<User>(`/api/users/${id}/deactivate`, body),
    onSuccess: refresh(queryClient),
  });
}

export function useUnlockUser(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => http.post<User>(`/api/users/${id}/unlock`),
    onSuccess: refresh(queryClient),
  });
}

export function useInviteAgain(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: () => http.post<undefined>(`/api/users/${id}/invite`),
    onSuccess: refresh(queryClient),
  });
}
