import type { QueryClient } from '@tanstack/react-query';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { GrantRole, Membership } from '../../../../shared/contracts/memberships.ts';
import { http } from '../../lib/http.ts';

/** Grants are read with the person who has them; one's own decide what every page offers. */
function refresh(queryClient: QueryClient) {
  return () =>
    Promise.all(
      ['users', 'sessions', 'sites'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })),
    );
}

export function useGrantRole() {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: GrantRole) => http.post<Membership>('/api/memberships', body),
    onSuccess: refresh(queryClient),
  });
}

export function useEndGrant(id: number) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (reason: string) => http.post<Membership>(`/api/memberships/${id}/end`, { reason }),
    onSuccess: refresh(queryClient),
  });
}
