import type { QueryClient } from '@tanstack/react-query';
import { infiniteQueryOptions, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import type { Bottle } from '../../../../shared/contracts/bottles.ts';
import type {
  AmendCalibration,
  Calibration,
  CalibrationRow,
  CalibrationsQuery,
  Prompt,
  ReviewCalibration,
  StartCalibration,
} from '../../../../shared/contracts/calibrations.ts';
import type { ListOf } from '../../../../shared/contracts/common.ts';
import type { Instrument } from '../../../../shared/contracts/instruments.ts';
import type { Probe, ProbeRow } from '../../../../shared/contracts/probes.ts';
import type { Standard } from '../../../../shared/contracts/standards.ts';
import { http, NetworkFailure } from '../../lib/http.ts';
import { keepRun, keptRun } from './offline/deed-store.ts';

export type CalibrationFilters = Partial<Omit<CalibrationsQuery, 'limit' | 'cursor'>>;

const PAGE = 100;

export const calibrationsList = (filters: CalibrationFilters) =>
  infiniteQueryOptions({
    queryKey: ['calibrations', 'list', filters] as const,
    queryFn: ({ signal, pageParam }) =>
      http.get<ListOf<CalibrationRow>>('/api/calibrations', {
        query: { ...filters, limit: PAGE, cursor: pageParam },
        signal,
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
  });

/** A few rows that decide something on another page: running runs, earlier results. */
export const calibrationsBrief = (filters: CalibrationFilters & { limit?: number }) =>
  queryOptions({
    queryKey: ['calibrations', 'list', 'brief', filters] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<CalibrationRow>>('/api/calibrations', { query: { limit: 50, ...filters }, signal }),
  });

/** A run; without network the state in which this phone last saw it. */
export const calibrationDetail = (id: number, userId: number) =>
  queryOptions({
    queryKey: ['calibrations', 'detail', id] as const,
    queryFn: async ({ signal }) => {
      try {
        const calibration = await http.get<Calibration>(`/api/calibrations/${id}`, { signal });
        await keepRun(userId, calibration);
        return calibration;
      } catch (error) {
        const kept = error instanceof NetworkFailure ? await keptRun(userId, id) : null;
        if (kept) return kept;
        throw error;
      }
    },
    // At a probe without network the phone's own copy must come at once, not after the query waits for a network.
    networkMode: 'always',
  });

export const openPrompts = () =>
  queryOptions({
    queryKey: ['prompts', 'list', { open: '1' }] as const,
    queryFn: ({ signal }) => http.get<ListOf<Prompt>>('/api/prompts', { query: { open: '1' }, signal }),
  });

/** The probes whose tag, serial or point a scanned or typed code fits. */
export const probesByCode = (code: string) =>
  queryOptions({
    queryKey: ['probes', 'list', 'by-code', code] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<ProbeRow>>('/api/probes', { query: { q: code, limit: 20 }, signal }),
    enabled: code.length >= 2,
  });

export const probeToCalibrate = (id: number) =>
  queryOptions({
    queryKey: ['probes', 'detail', id] as const,
    queryFn: ({ signal }) => http.get<Probe>(`/api/probes/${id}`, { signal }),
  });

export const releasedLots = () =>
  queryOptions({
    queryKey: ['standards', 'list', 'for-runs'] as const,
    queryFn: ({ signal }) => http.get<ListOf<Standard>>('/api/standards', { query: { limit: 200 }, signal }),
  });

export const usableBottles = () =>
  queryOptions({
    queryKey: ['bottles', 'list', { usable: '1' }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Bottle>>('/api/bottles', { query: { usable: '1', limit: 500 }, signal }),
  });

export const usableThermometers = () =>
  queryOptions({
    queryKey: ['instruments', 'list', { kind: 'thermometer', usable: '1' }] as const,
    queryFn: ({ signal }) =>
      http.get<ListOf<Instrument>>('/api/instruments', {
        query: { kind: 'thermometer', usable: '1', limit: 100 },
        signal,
      }),
  });

interface Colleague {
  id: number;
  name: string;
}

/** People a run may be handed over to; who may take it, the server decides. */
export const colleagues = () =>
  queryOptions({
    queryKey: ['users', 'list', 'colleagues'] as const,
    queryFn: ({ signal }) => http.get<ListOf<Colleague>>('/api/users', { query: { limit: 200 }, signal }),
  });

/** Puts an answer about a run where every page finds it. */
export function keepAnswer(queryClient: QueryClient, userId: number, calibration: Calibration): void {
  queryClient.setQueryData(calibrationDetail(calibration.id, userId).queryKey, calibration);
  void keepRun(userId, calibration);
}

export function useStartCalibration(userId: number) {
  const queryClient = useQueryClient();
  return useMutation({
    // Without network it must say so at once, not wait unseen.
    networkMode: 'always',
    mutationFn: (body: StartCalibration) => http.post<Calibration>('/api/calibrations', body),
    onSuccess: (calibration) => {
      keepAnswer(queryClient, userId, calibration);
      return queryClient.invalidateQueries({ queryKey: ['calibrations', 'list'] });
    },
  });
}

interface Deeds {
  stop: { reason: string; capturedAt: string };
  'hand-over': { toUserId: number; reason: string };
  sign: { password: string; capturedAt: string };
  review: ReviewCalibration;
  amend: AmendCalibration;
}

/** What needs the server's answer at once: stop, hand over, sign, review, amend. */
export function useCalibrationDeed<Verb extends keyof Deeds>(id: number, verb: Verb, userId: number) {
  const queryClient = useQueryClient();
  return useMutation({
    networkMode: 'always',
    mutationFn: (body: Deeds[Verb]) => http.post<Calibration>(`/api/calibrations/${id}/${verb}`, body),
    onSuccess: (calibration) => {
      keepAnswer(queryClient, userId, calibration);
      return Promise.all(
        ['calibrations', 'prompts', 'probes', 'points', 'readings'].map((slice) =>
          queryClient.invalidateQueries({ queryKey: [slice] }),
        ),
      );
    },
  });
}

/** The device has not confirmed the constant: order it once more. */
export function useRepeatCommand(id: number, userId: number) {
  const queryClient = useQueryClient();
  return useMutation({
    networkMode: 'always',
    mutationFn: () => http.post<Calibration>(`/api/calibrations/${id}/command`),
    onSuccess: (calibration) => keepAnswer(queryClient, userId, calibration),
  });
}
