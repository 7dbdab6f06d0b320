import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Device, IssueCredentials, IssuedCredentials } from '../../../../shared/contracts/devices.ts';
import { http } from '../../lib/http.ts';

/** Every device a probe has had, withdrawn ones included. */
export const probeDevices = (probeId: number) =>
  queryOptions({
    queryKey: ['devices', 'list', { probeId }] as const,
    queryFn: ({ signal }) => http.get<ListOf<Device>>('/api/devices', { query: { probeId }, signal }),
  });

function useRefreshDevices() {
  const queryClient = useQueryClient();
  return () =>
    Promise.all(['devices', 'probes'].map((slice) => queryClient.invalidateQueries({ queryKey: [slice] })));
}

// The secrets that come back are kept by the dialog that shows them once, never in the query cache.

export function useIssueCredentials() {
  const refresh = useRefreshDevices();
  return useMutation({
    mutationFn: (body: IssueCredentials) => http.post<IssuedCredentials>('/api/devices', body),
    onSuccess: refresh,
    gcTime: 0,
  });
}

export function useReplaceCredentials(deviceId: number) {
  const refresh = useRefreshDevices();
  return useMutation({
    mutationFn: (reason: string) =>
      http.post<IssuedCredentials>(`/api/devices/${deviceId}/replace`, { reason }),
    onSuccess: refresh,
    gcTime: 0,
  });
}

export function useRevokeCredentials(deviceId: number) {
  const refresh = useRefreshDevices();
  return useMutation({
    mutationFn: (reason: string) => http.post<Device>(`/api/devices/${deviceId}/revoke`, { reason }),
    onSuccess: refresh,
  });
}
