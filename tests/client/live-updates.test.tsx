import { QueryClient } from '@tanstack/react-query';
import { act, cleanup, renderHook, waitFor } from '@testing-library/react';
import { afterEach, beforeEach, expect, it } from 'vitest';
import {
  clearLiveReadings,
  flushReadings,
  joinInOrder,
  LIVE_CAPACITY,
  receiveReadings,
  useLatestReading,
  useLiveReadings,
} from '../../client/src/lib/live-readings.ts';
import { invalidateBySlice } from '../../client/src/lib/live-updates.ts';
import type { LivePoint } from '../../shared/contracts/realtime.ts';

const point = (second: number, conductivityUsCm = 1000 + second): LivePoint => ({
  at: new Date(Date.UTC(2026, 11, 1, 12, 0, second)).toISOString(),
  conductivityUsCm,
  temperatureC: 25,
  valueUsCm: conductivityUsCm,
  context: 'process',
  quality: 'good',
  flags: [],
});

beforeEach(clearLiveReadings);
afterEach(cleanup);

it('shows a reader the points of its own probe only', () => {
  const { result } = renderHook(() => useLiveReadings(7));
  act(() => {
    receiveReadings({ probe: 7, points: [point(1), point(2)] });
    receiveReadings({ probe: 8, points: [point(3)] });
    flushReadings();
  });
  expect(result.current.map((one) => one.conductivityUsCm)).toEqual([1001, 1002]);
});

it('joins many batches into one change per frame', () => {
  let renders = 0;
  renderHook(() => {
    renders += 1;
    return useLatestReading(7);
  });
  act(() => {
    for (let second = 1; second <= 20; second += 1) receiveReadings({ probe: 7, points: [point(second)] });
    flushReadings();
  });
  expect(renders).toBe(2);
});

it('forgets everything at sign-out', () => {
  const { result } = renderHook(() => useLatestReading(7));
  act(() => {
    receiveReadings({ probe: 7, points: [point(1)] });
    flushReadings();
  });
  expect(result.current?.conductivityUsCm).toBe(1001);
  act(clearLiveReadings);
  expect(result.current).toBeNull();
});

it('puts a late point where it belongs and drops a repeated one', () => {
  const joined = joinInOrder([point(1), point(3)], [point(2), point(3)]);
  expect(joined.map((one) => one.at.slice(17, 19))).toEqual(['01', '02', '03']);
});

it('keeps no more than its capacity, the newest', () => {
  const many = Array.from({ length: LIVE_CAPACITY + 5 }, (_, i) => point(i));
  const kept = joinInOrder([], many);
  expect(kept).toHaveLength(LIVE_CAPACITY);
  expect(kept.at(-1)).toEqual(many.at(-1));
});

it('refetches a slice once however many changes arrive in a frame, and no other slice', async () => {
  const queryClient = new QueryClient();
  const fetched = { probes: 0, checks: 0 };
  const watch = (slice: keyof typeof fetched) =>
    queryClient.fetchQuery({ queryKey: [slice, 'list', {}], queryFn: () => (fetched[slice] += 1) });
  await Promise.all([watch('probes'), watch('checks')]);
  const invalidate = invalidateBySlice(queryClient);
  for (let i = 0; i < 50; i += 1) invalidate('probes');
  const isStale = (slice: string) => queryClient.getQueryState([slice, 'list', {}])?.isInvalidated;
  await waitFor(() => expect(isStale('probes')).toBe(true));
  expect(isStale('checks')).toBe(false);
});

it('a change of a device fetches again the probe that shows it', async () => {
  const queryClient = new QueryClient();
  await queryClient.fetchQuery({ queryKey: ['probes', 'detail', 7], queryFn: () => 'not connected' });
  invalidateBySlice(queryClient)('devices');
  const isStale = () => queryClient.getQueryState(['probes', 'detail', 7])?.isInvalidated;
  await waitFor(() => expect(isStale()).toBe(true));
});
