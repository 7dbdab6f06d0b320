import { useMutation, useQueryClient } from '@tanstack/react-query';
import type { HoldPoint, Point } from '../../../../shared/contracts/points.ts';
import { http } from '../../lib/http.ts';

/** A hold shows on the live board, on the point and on its probe. */
function useRefreshAfterHold() {
  const queryClient = useQueryClient();
  return () =>
    Promise.all(
      ['points', 'readings', 'probes'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })),
    );
}

export function useHoldPoint() {
  const refresh = useRefreshAfterHold();
  return useMutation({
    mutationFn: ({ id, ...body }: HoldPoint & { id: number }) =>
      http.post<Point>(`/api/points/${id}/hold`, body),
    onSuccess: refresh,
  });
}

export function useReleasePoint() {
  const refresh = useRefreshAfterHold();
  return useMutation({
    mutationFn: ({ id }: { id: number }) => http.delete<Point>(`/api/points/${id}/hold`),
    onSuccess: refresh,
  });
}
