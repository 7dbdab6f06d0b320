import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Setting } from '../../../../shared/contracts/settings.ts';
import { http } from '../../lib/http.ts';

export const settingsList = () =>
  queryOptions({
    queryKey: ['settings', 'list', {}] as const,
    queryFn: ({ signal }) => http.get<ListOf<Setting>>('/api/settings', { signal }),
  });

export interface SettingChange {
  value: unknown;
  reason: string;
  version: number;
}

export function useChangeSetting(key: string) {
  const queryClient = useQueryClient();
  return useMutation({
    mutationFn: (body: SettingChange) => http.put<Setting>(`/api/settings/${key}`, body),
    // The values decide how every reading is judged.
    onSuccess: () =>
      Promise.all(
        ['settings', 'readings', 'probes'].map((slice) =>
          queryClient.invalidateQueries({ queryKey: [slice] }),
        ),
      ),
  });
}
