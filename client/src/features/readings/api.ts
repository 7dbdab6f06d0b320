import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import type { LiveBoard, Series } from '../../../../shared/contracts/readings.ts';
import { http } from '../../lib/http.ts';

/** Trust also changes by mere passing of time (a probe falls silent, a check falls due): ask again this often. */
const BOARD_EVERY_MS = 20_000;

/** A site's points as they read now; for all sites (null) those that need a person first. */
export const liveBoard = (siteId: number | null) =>
  queryOptions({
    queryKey: ['readings', 'list', { siteId }] as const,
    queryFn: ({ signal }) => http.get<LiveBoard>('/api/readings/live', { query: { siteId }, signal }),
    refetchInterval: BOARD_EVERY_MS,
  });

export interface Period {
  /** ms since 1970. */
  from: number;
  to: number;
}

/** The history of one probe over a period, in at most 1 000 points. */
export const seriesDetail = (probeId: number, { from, to }: Period) =>
  queryOptions({
    queryKey: ['readings', 'detail', probeId, 'series', { from, to }] as const,
    queryFn: ({ signal }) =>
      http.get<Series>('/api/readings', {
        query: { probeId, from: new Date(from).toISOString(), to: new Date(to).toISOString() },
        signal,
      }),
    placeholderData: keepPreviousData,
  });
