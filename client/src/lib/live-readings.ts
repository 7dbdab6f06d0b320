import { useSyncExternalStore } from 'react';
import type { LivePoint, ReadingsUpdate } from '../../../shared/contracts/realtime.ts';

/**
 * Live readings live outside the query cache: structural sharing over thousands of points several times a second
 * would cost more than drawing them. One ring buffer a probe; what readers get is a new array once per frame.
 */

/** Two hours at one reading a second, the longest live window a page draws. */
export const LIVE_CAPACITY = 7200;

const EMPTY: readonly LivePoint[] = [];
const series = new Map<number, readonly LivePoint[]>();
const waiting = new Map<number, LivePoint[]>();
const listeners = new Map<number, Set<() => void>>();
let frame: number | null = null;

/** Take in a batch; readers hear of it with the next frame. */
export function receiveReadings({ probe, points }: ReadingsUpdate): void {
  const queue = waiting.get(probe);
  if (queue) queue.push(...points);
  else waiting.set(probe, [...points]);
  frame ??= requestAnimationFrame(flushReadings);
}

/** Show what waits now; called once per frame. */
export function flushReadings(): void {
  frame = null;
  for (const [probe, points] of waiting) {
    series.set(probe, joinInOrder(series.get(probe) ?? EMPTY, points));
    for (const listener of listeners.get(probe) ?? []) listener();
  }
  waiting.clear();
}

/** The live points of a probe since the page began to watch it, oldest first, at most LIVE_CAPACITY. */
export function useLiveReadings(probeId: number | null | undefined): readonly LivePoint[] {
  return useSyncExternalStore(
    (listener) => (probeId == null ? () => undefined : listenTo(probeId, listener)),
    () => (probeId == null ? EMPTY : (series.get(probeId) ?? EMPTY)),
  );
}

/** The newest live point of a probe, or null before the first. */
export function useLatestReading(probeId: number | null | undefined): LivePoint | null {
  return useLiveReadings(probeId).at(-1) ?? null;
}

/** Forget everything: at sign-out nothing of the last person's readings stays in memory. */
export function clearLiveReadings(): void {
  series.clear();
  waiting.clear();
  for (const group of listeners.values()) for (const listener of group) listener();
}

/** Points almost always come in order; a late one is put where it belongs, a repeated one is dropped. */
export function joinInOrder(known: readonly LivePoint[], fresh: readonly LivePoint[]): readonly LivePoint[] {
  const last = known.at(-1)?.at ?? '';
  let joined = [...known, ...fresh];
  const isInOrder = fresh.every((point, i) => point.at > (fresh[i - 1]?.at ?? last));
  if (!isInOrder) {
    const byTime = new Map(joined.map((point) => [point.at, point]));
    joined = [...byTime.values()].sort((a, b) => (a.at < b.at ? -1 : 1));
  }
  return joined.slice(-LIVE_CAPACITY);
}

function listenTo(probeId: number, listener: () => void): () => void {
  const group = listeners.get(probeId) ?? new Set();
  group.add(listener);
  listeners.set(probeId, group);
  return () => group.delete(listener);
}
